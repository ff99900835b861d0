import { View } from 'react-native';
import type { SpareHistoryDto } from '@/shared/contract/spare';
import { stageWords } from '../charge/card-model';
import type { Stage } from '@/shared/contract/charge';
import { date } from '../format/clock';
import { useFormats } from '../format/formats';
import { volts } from '../format/quantities';
import { PressableLink } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

/** Every charge it was on, newest first. */
export function SpareCharges({
  charges,
  now,
  onOpen,
}: {
  charges: SpareHistoryDto['charges'];
  now: number;
  onOpen: (id: string) => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  return (
    <View>
      <Txt kind="heading" heading={2} style={styles.head}>
        Charges
      </Txt>
      {charges.length === 0 ? (
        <Txt kind="small" tone="ink2">
          None yet.
        </Txt>
      ) : (
        <View role="list" aria-label="Charges">
          {charges.map((charge) => (
            <View role="listitem" key={charge.id}>
              <PressableLink
                href={`/charges/${charge.id}`}
                onGo={() => onOpen(charge.id)}
                style={({ pressed }) => [styles.row, pressed && styles.pressed]}
              >
                <View style={styles.words}>
                  <Txt bold numberOfLines={1}>
                    {charge.title}
                  </Txt>
                  <Txt kind="small" tone="ink2">
                    {`${stageWords({ stage: charge.stage as Stage, heldFrom: null })}, ${date(Date.parse(charge.at), zone, now)}`}
                  </Txt>
                </View>
                <Txt kind="numS" nowrap>{`to ${volts(charge.targetVolts, marks)}`}</Txt>
              </PressableLink>
            </View>
          ))}
        </View>
      )}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  head: { marginBottom: 6 },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    minHeight: 52,
    paddingVertical: 4,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  pressed: { backgroundColor: colors.well },
  words: { flex: 1, minWidth: 0 },
}));
