import { Pressable, View } from 'react-native';
import { photoOf, photoSightNames, type PhotoDto } from '@/shared/contract/photo';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { domElement } from '../primitives/dom-element';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { photoAlt } from './photo-words';

/** The photos as thumbnails with what they show; each opens the whole picture. */
export function PhotoGrid({
  photos,
  now,
  address,
  onOpen,
}: {
  photos: readonly PhotoDto[];
  now: number;
  /** Where the thumbnail of a photo is. */
  address: (id: string) => string;
  onOpen: (id: string) => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  return (
    <View style={styles.grid} role="list" aria-label="Photos">
      {photos.map((photo) => {
        const alt = photoAlt(photo, moment(Date.parse(photo.at), zone, now, marks));
        const bad = photo.seen !== 'none';
        return (
          <View key={photo.id} role="listitem">
            <Pressable role="button" aria-label={alt} onPress={() => onOpen(photo.id)} style={styles.tile}>
              {domElement('img', {
                src: address(photo.id),
                alt: '',
                loading: 'lazy',
                width: 108,
                height: 108,
                style: [styles.picture, { objectFit: 'cover' }],
              })}
              <Txt kind="small" bold={bad} tone={bad ? 'alarm' : 'ink2'} numberOfLines={2}>
                {bad ? `${photoOf(photo)}, ${photoSightNames[photo.seen].toLowerCase()}` : photoOf(photo)}
              </Txt>
            </Pressable>
          </View>
        );
      })}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  grid: { flexDirection: 'row', flexWrap: 'wrap', columnGap: 8, rowGap: 12 },
  tile: { width: 108, rowGap: 4 },
  picture: { width: 108, height: 108, borderRadius: 4, backgroundColor: colors.well },
}));
