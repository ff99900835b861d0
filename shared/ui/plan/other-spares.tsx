import { View } from 'react-native';
import type { PlanDto } from '@/shared/contract/plan';
import type { SpareDto } from '@/shared/contract/spare';
import { durationBand } from '../format/duration';
import { clock } from '../format/clock';
import { useFormats } from '../format/formats';
import { Duration } from '../primitives/num';
import { PressableLink } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { SpareColumn } from '../spare/spare-column';
import { isCapacityGuessed, sourceWords } from '../spare/spare-words';
import { makeStyles } from '../theme/make-styles';
import { bestOption } from './best-option';

export interface PlannedSpare {
  spare: SpareDto;
  /** Null: reckoned or not to be reckoned. */
  dto: PlanDto | null;
}

/** Spares of the same type that can be planned instead, soonest first. */
export function OtherSpares({
  others,
  clipOnAt,
  onTake,
}: {
  others: readonly PlannedSpare[];
  clipOnAt: number;
  onTake: (spareId: string) => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  if (others.length === 0)
    return <Txt tone="ink2">No other spare of this type is on the shelf to be planned instead.</Txt>;
  return (
    <View>
      <View style={styles.head}>
        <Txt kind="heading" heading={2}>
          Spares that can be planned
        </Txt>
        <Txt kind="small" tone="ink2" nowrap>{`from ${clock(clipOnAt, zone, marks)}`}</Txt>
      </View>
      {others.map(({ spare, dto }) => {
        const option = dto ? bestOption(dto.plan) : null;
        return (
          <PressableLink
            key={spare.id}
            href={`/plan?spare=${spare.id}`}
            onGo={() => onTake(spare.id)}
            label={`Plan with ${spare.label}`}
            style={({ pressed }) => [styles.row, pressed && styles.pressed]}
          >
            <View style={styles.column}>
              <SpareColumn item={{ spare, card: null }} />
            </View>
            <View style={styles.words}>
              <Txt kind="numS">{spare.label}</Txt>
              <Txt kind="small" tone="ink2">
                {[
                  spare.shelfPlace,
                  `capacity ${isCapacityGuessed(spare) ? 'guessed' : sourceWords[spare.capacitySource]}`,
                ]
                  .filter(Boolean)
                  .join(' · ')}
              </Txt>
            </View>
            {option ? (
              <View style={styles.right}>
                <Duration kind="numM" align="right" seconds={option.totalS.p50} />
                <Txt tone="ink2" nowrap align="right">
                  {durationBand(option.totalS)}
                </Txt>
              </View>
            ) : (
              <Txt kind="small" tone="ink2">
                {dto ? 'no way' : ''}
              </Txt>
            )}
          </PressableLink>
        );
      })}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  head: {
    flexDirection: 'row',
    justifyContent: 'space-between',
    alignItems: 'baseline',
    columnGap: 12,
    paddingBottom: 4,
  },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    minHeight: 70,
    paddingVertical: 4,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  pressed: { backgroundColor: colors.well },
  column: { width: 72 },
  words: { flex: 1, minWidth: 0 },
  right: { alignItems: 'flex-end' },
}));
