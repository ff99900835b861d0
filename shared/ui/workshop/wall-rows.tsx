import { View } from 'react-native';
import type { WallDto } from '@/shared/contract/wall';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { NBSP } from '../format/marks';
import { shortest } from '../format/number';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

/** Screens that show the board: when each was last heard, and the way to take it back. */
export function WallRows({
  walls,
  now,
  mayTakeBack,
  onTakeBack,
}: {
  walls: readonly WallDto[];
  now: number;
  mayTakeBack: boolean;
  onTakeBack: (wall: WallDto) => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const details = (wall: WallDto) =>
    [
      wall.lastHeardAt === null
        ? 'read only, not heard yet'
        : `read only, heard ${moment(Date.parse(wall.lastHeardAt), zone, now, marks)}`,
      wall.diagonalInches === null ? null : `${shortest(wall.diagonalInches, 1, marks)}${NBSP}in`,
      wall.distanceMetres === null ? null : `read from ${shortest(wall.distanceMetres, 1, marks)}${NBSP}m`,
      wall.approvedBy ? `approved by ${wall.approvedBy}` : null,
    ]
      .filter(Boolean)
      .join(' · ');
  return (
    <View role="list" aria-label="Walls">
      {walls.map((wall, index) => (
        <View key={wall.id} role="listitem" style={[styles.row, index > 0 && styles.ruled]}>
          <View style={styles.words}>
            <Txt bold>{wall.name}</Txt>
            <Txt kind="small" tone="ink2">
              {details(wall)}
            </Txt>
          </View>
          {mayTakeBack ? (
            <Link
              kind="small"
              align="right"
              title="take back"
              label={`Take back ${wall.name}`}
              onPress={() => onTakeBack(wall)}
            />
          ) : null}
        </View>
      ))}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: { flexDirection: 'row', alignItems: 'center', columnGap: 12, minHeight: 56, paddingVertical: 4 },
  ruled: { borderTopWidth: 1, borderTopColor: colors.line },
  words: { flex: 1, minWidth: 0 },
}));
