import { useState } from 'react';
import { View } from 'react-native';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { photoAddress, useAddPhoto } from '@/shared/client/repairs';
import type { RepairDto } from '@/shared/contract/repair';
import { Button } from '@/shared/ui/primitives/button';
import { StatusRegion } from '@/shared/ui/primitives/live-region';
import { Txt } from '@/shared/ui/primitives/txt';
import { PhotoGrid } from '@/shared/ui/repair/photo-grid';
import { conditionText, photoProblem, sendingText } from '@/shared/ui/repair/photo-words';
import { canPickPhoto, pickPhoto } from '@/shared/ui/repair/pick-photo';
import { PhotoSheet } from './photo-sheet';

interface Sending {
  bytes: number;
  share: number;
}

/** The photos of a repair, what they show of its modules, and taking another. */
export function PhotosPart({
  repair,
  now,
  offline,
  mayWrite,
}: {
  repair: RepairDto;
  now: number;
  offline: boolean;
  mayWrite: boolean;
}) {
  const add = useAddPhoto();
  const [sending, setSending] = useState<Sending | null>(null);
  const [problem, setProblem] = useState<string | null>(null);
  const [shown, setShown] = useState<string | null>(null);
  const photo = repair.photos.find(({ id }) => id === shown) ?? null;

  const take = async (from: 'camera' | 'files') => {
    const picked = await pickPhoto(from);
    if (!picked) return;
    const wrong = photoProblem(picked);
    setProblem(wrong);
    if (wrong !== null) return;
    const { bytes, file, mark } = picked;
    setSending({ bytes, share: 0 });
    add.mutate(
      { id: repair.id, file, mark, onSent: (share) => setSending({ bytes, share }) },
      {
        onError: (error) => setProblem((isProblem(error) && error.fields.photo) || sentenceOf(error)),
        onSettled: () => setSending(null),
      },
    );
  };

  const open = repair.state === 'open' || repair.state === 'handed-over';
  return (
    <View style={{ rowGap: 10 }}>
      <Txt kind="heading" heading={2}>
        Photos
      </Txt>
      {repair.conditions.map((condition) => (
        <Txt key={condition.modulePosition} bold tone={condition.fate === null ? 'alarm' : 'ink'}>
          {conditionText(condition)}
        </Txt>
      ))}
      {repair.photos.length === 0 ? (
        <Txt tone="ink2">No photos yet. One of each module that comes out tells most.</Txt>
      ) : (
        <PhotoGrid
          photos={repair.photos}
          now={now}
          address={(id) => photoAddress(id, 'thumbnail')}
          onOpen={(id) => setShown(id)}
        />
      )}
      {sending ? <Txt kind="small">{sendingText(sending.bytes, sending.share)}</Txt> : null}
      <StatusRegion text={sending ? 'Sending the photo' : ''} />
      {problem ? (
        <Txt kind="label" tone="alarm" role="alert">
          {problem}
        </Txt>
      ) : null}
      {!open ? null : canPickPhoto ? (
        <View style={{ flexDirection: 'row', flexWrap: 'wrap', columnGap: 8, rowGap: 8 }}>
          <Button
            look="line"
            size="small"
            title="Take a photo"
            disabled={!mayWrite}
            busy={add.isPending}
            describedBy="photos-why"
            onPress={() => void take('camera')}
          />
          <Button
            look="line"
            size="small"
            icon="upload"
            title="Choose a photo"
            disabled={!mayWrite}
            busy={add.isPending}
            describedBy="photos-why"
            onPress={() => void take('files')}
          />
        </View>
      ) : (
        <Txt tone="ink2">Photos are added in a browser.</Txt>
      )}
      {offline && open ? (
        <Txt kind="small" tone="ink2" nativeID="photos-why">
          No connection: photos can be sent when it is back.
        </Txt>
      ) : null}
      {photo ? (
        <PhotoSheet
          key={photo.id}
          repair={repair}
          photo={photo}
          now={now}
          mayWrite={mayWrite}
          onClose={() => setShown(null)}
        />
      ) : null}
    </View>
  );
}
