import { View } from 'react-native';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { CardColumn } from '../charge/card-column';
import { markOf, readyOf, stageWords, type CardClock } from '../charge/card-model';
import { readyAt, readyBounds } from '../format/clock';
import { useFormats } from '../format/formats';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { PressableLink } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { makeStyles } from '../theme/make-styles';
import { fact, waiting } from './bench-words';
import { nextStep } from './next-step';

/** A charge that needs somebody now: amber for a check or a hand, red where it is late. Its head opens it. */
export function BenchCallOut({
  card,
  at,
  lagLimitVolts,
  beside = false,
  onGo,
}: {
  card: ChargeCardDto;
  at: CardClock;
  lagLimitVolts?: number;
  /** It shares its row with another one: the desk. */
  beside?: boolean;
  onGo: (path: string) => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const step = nextStep(card);
  const red = card.overdueSince !== null;
  const ready = card.stage === 'check-due' ? null : readyOf(card, at);
  const live = `/charges/${card.id}`;
  return (
    <CallOut
      tone={red ? 'red' : 'amber'}
      label={`${card.title}, ${red ? 'overdue' : stageWords(card)}`}
      style={beside && styles.beside}
    >
      <PressableLink href={live} onGo={() => onGo(live)} style={styles.open} label={`Open ${card.title}`}>
        <View style={styles.head}>
          <StageTag stage={markOf(card)} text={card.nextHand !== null && !red ? 'A hand is needed' : undefined} />
          <Txt kind="label" nowrap>
            {waiting(card, at.now)}
          </Txt>
        </View>
        <View style={styles.middle}>
          <View style={styles.words}>
            <Txt kind="numM" heading={2}>
              {card.title}
            </Txt>
            <Txt tone="ink2">{fact(card, stageWords(card), at.now)}</Txt>
            {red && ready ? (
              <View style={styles.now}>
                <Txt tone="ink2" nowrap>{`now ready ${readyAt(ready, zone, at.now, marks)}`}</Txt>
                <Txt tone="ink2" nowrap>{`(${readyBounds(ready, zone, at.now, marks)})`}</Txt>
              </View>
            ) : null}
          </View>
          <CardColumn card={card} lagLimitVolts={lagLimitVolts} />
        </View>
      </PressableLink>
      {step ? (
        <Button title={step.title} onPress={() => onGo(step.path)} label={`${step.title}, ${card.title}`} />
      ) : null}
    </CallOut>
  );
}

const useStyles = makeStyles(() => ({
  beside: { flexGrow: 1, flexShrink: 1, flexBasis: 0, minWidth: 0, justifyContent: 'space-between' },
  open: { marginBottom: 10 },
  head: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', columnGap: 12 },
  middle: {
    flexDirection: 'row',
    alignItems: 'flex-end',
    justifyContent: 'space-between',
    columnGap: 12,
    marginTop: 8,
  },
  words: { flex: 1, minWidth: 0 },
  now: { flexDirection: 'row', flexWrap: 'wrap', columnGap: 5 },
}));
