import { View } from 'react-native';
import { repairStepNames } from '@/shared/contract/repair-steps';
import { BenchTime } from '../bench/bench-time';
import { firstName, isUnderWay, markOf } from '../charge/card-model';
import { CardRibbon } from '../charge/card-ribbon';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { PressableLink } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { makeStyles } from '../theme/make-styles';
import { isLate, rowLabel, type RepairsShown } from './repair-table';
import { signOf, stepNumber, stepsOfCard, vehicleAndBay, waitsFor } from './repair-words';
import { StepBars } from './step-strip';

/** The repairs of the phone, rows as the bench's. The whole row opens it. */
export function RepairRows({ cards, at, old = false, onOpen }: RepairsShown) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const moments = (instant: string) => moment(Date.parse(instant), zone, at.now, marks);
  return (
    <View role="list" aria-label="Repairs">
      {cards.map((card) => {
        const sign = signOf(card);
        const { charge } = card;
        const late = isLate(card, at.now);
        return (
          <View key={card.id} role="listitem">
            <PressableLink
              href={`/repairs/${card.id}`}
              onGo={() => onOpen(card.id)}
              label={rowLabel(card, moments, at.now)}
              style={({ pressed }) => [styles.row, pressed && styles.pressed]}
            >
              <View style={styles.line}>
                <View style={styles.names}>
                  <Txt kind="numM" nowrap>
                    {card.number}
                  </Txt>
                  <Txt tone="ink2" numberOfLines={1} style={styles.shrink}>
                    {vehicleAndBay(card)}
                  </Txt>
                </View>
                {card.promisedAt ? (
                  <Txt kind="small" tone={late ? 'alarm' : 'ink2'} bold={late} nowrap>
                    {`due ${moments(card.promisedAt)}`}
                  </Txt>
                ) : null}
              </View>
              <View style={styles.line}>
                <StepBars small steps={stepsOfCard(card)} mark={charge ? markOf(charge) : null} />
                <Txt kind="small" tone="ink2" nowrap>
                  {card.step === null ? 'Handed over' : `${repairStepNames[card.step]}, ${stepNumber(card.step)} of 7`}
                </Txt>
              </View>
              <View style={styles.line}>
                {sign ? <StageTag stage={sign.mark} text={sign.word} /> : null}
                <Txt kind="small" tone="ink2" style={sign ? styles.right : styles.shrink}>
                  {waitsFor(card, moments, at.now)}
                </Txt>
              </View>
              {charge && !card.block ? (
                <View style={styles.line}>
                  <BenchTime card={charge} at={at} old={old} kind="numM" />
                  <Txt kind="small" tone="ink2" nowrap>
                    {card.people[0] ? firstName(card.people[0].name) : 'nobody'}
                  </Txt>
                </View>
              ) : null}
              {charge && isUnderWay(charge) ? (
                <CardRibbon card={charge} at={at} height={48} axis={false} stale={old} />
              ) : null}
            </PressableLink>
          </View>
        );
      })}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: { paddingTop: 12, paddingBottom: 14, borderBottomWidth: 1, borderBottomColor: colors.line, rowGap: 6 },
  pressed: { backgroundColor: colors.well },
  line: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', columnGap: 12 },
  names: { flexDirection: 'row', alignItems: 'baseline', columnGap: 12, flexShrink: 1, minWidth: 0 },
  shrink: { flexShrink: 1 },
  right: { flexShrink: 1, textAlign: 'right' },
}));
