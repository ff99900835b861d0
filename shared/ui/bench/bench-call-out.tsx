import { View } from 'react-native';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { CardColumn } from '../charge/card-column';
import { markOf, readyOf, stageWords } from '../charge/card-model';
import { duration } from '../format/duration';
import { readyWithBand } from '../format/clock';
import { useFormats } from '../format/formats';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { makeStyles } from '../theme/make-styles';
import { nextStep } from './next-step';

const since = (instant: string, now: number) => duration((now - Date.parse(instant)) / 1000, 'minute');

/** What a charge that waits for a person says of itself, beside its tag. */
function waiting(card: ChargeCardDto, now: number): string {
  if (card.overdueSince !== null) return `${since(card.overdueSince, now)} over`;
  if (card.stage === 'check-due' && card.checkDueAt) return `${since(card.checkDueAt, now)} waiting`;
  return '';
}

/** A charge that needs somebody now: amber for a check, red where it is late. */
export function BenchCallOut({ card, now, onGo }: { card: ChargeCardDto; now: number; onGo: (path: string) => void }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const step = nextStep(card);
  const red = card.overdueSince !== null;
  const ready = readyOf(card, now);
  const where = card.channelNames.length > 0 ? ` at ${card.channelNames.join(', ')}` : '';
  const rested = card.stage === 'check-due' && card.currentEndAt ? `, rested ${since(card.currentEndAt, now)}` : '';
  const fact =
    red && card.stage !== 'check-due'
      ? `${card.spare.label}${where}, ${stageWords(card).toLowerCase()}`
      : `${card.spare.label}${where}${rested}`;
  return (
    <CallOut tone={red ? 'red' : 'amber'} label={`${card.title}, ${red ? 'overdue' : stageWords(card)}`}>
      <View style={styles.head}>
        <StageTag stage={markOf(card)} text={card.nextHand && !red ? 'A hand is needed' : undefined} />
        <Txt kind="label" nowrap>
          {waiting(card, now)}
        </Txt>
      </View>
      <View style={styles.middle}>
        <View style={styles.words}>
          <Txt kind="numL" heading={2}>
            {card.title}
          </Txt>
          <Txt tone="ink2">{fact}</Txt>
          {red && ready && card.stage !== 'check-due' ? (
            <Txt tone="ink2">{`now ${readyWithBand(ready, zone, now, marks)}`}</Txt>
          ) : null}
        </View>
        <CardColumn card={card} />
      </View>
      <View style={styles.acts}>
        {step ? (
          <Button title={step.title} onPress={() => onGo(step.path)} label={`${step.title}, ${card.title}`} grow />
        ) : null}
        {step?.path === `/charges/${card.id}` ? null : (
          <Button look="line" title="Open" label={`Open ${card.title}`} onPress={() => onGo(`/charges/${card.id}`)} />
        )}
      </View>
    </CallOut>
  );
}

const useStyles = makeStyles(() => ({
  head: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', columnGap: 12 },
  middle: {
    flexDirection: 'row',
    alignItems: 'flex-end',
    justifyContent: 'space-between',
    columnGap: 12,
    marginVertical: 10,
  },
  words: { flex: 1, minWidth: 0 },
  acts: { flexDirection: 'row', columnGap: 8 },
}));
