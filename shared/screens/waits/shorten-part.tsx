import { useState } from 'react';
import { View } from 'react-native';
import { useLink } from '@/shared/client/link';
import { useReplay } from '@/shared/client/replays';
import type { Levers, ReplayAnswer } from '@/shared/contract/waits-replay';
import { Button } from '@/shared/ui/primitives/button';
import { Num } from '@/shared/ui/primitives/num';
import { Rule } from '@/shared/ui/primitives/rule';
import { Txt } from '@/shared/ui/primitives/txt';
import { leverAsk, leverKeys, leverNames, type LeverKey, type LeverTyped } from '@/shared/ui/waits/lever-form';
import { addressOfLevers, leversOfAddress } from '@/shared/ui/waits/lever-address';
import { LeverRow, ReplayLine } from '@/shared/ui/waits/lever-row';
import { leftOutWords, lostWithInterval, tooFewWords } from '@/shared/ui/waits/replay-words';
import { LeverFields } from './lever-fields';
import { ReplayState } from './replay-state';
import type { WaitAddressHeld } from './use-wait-address';

/** What is ticked and typed: kept here while it is typed, and in the address, so that a reload or a sent link has it. */
function useLevers({ params, set }: WaitAddressHeld) {
  const [typed, setTyped] = useState<LeverTyped>(() => leversOfAddress(params));
  return [
    typed,
    (next: LeverTyped) => {
      setTyped(next);
      set(addressOfLevers(next));
    },
  ] as const;
}

const same = (one: Levers, other: Levers) => JSON.stringify(one) === JSON.stringify(other);

/** What would shorten the waits: the period's charges replayed as they would have gone with something changed. */
export function ShortenPart({ address }: { address: WaitAddressHeld }) {
  const { from, to } = address.query;
  const replay = useReplay('what-if');
  const down = useLink().state === 'down';
  const [typed, setTyped] = useLevers(address);
  const [tried, setTried] = useState(false);
  // An answer belongs to the days it was asked for.
  const [askedFor, setAskedFor] = useState('');
  const ask = leverAsk(typed);
  const found = replay.job?.state === 'done' && askedFor === `${from} ${to}` ? replay.job.whatIf : null;
  const now = found?.now.enough ? found.now.lostHoursPerWeek.value : null;
  const answerOf = (key: LeverKey): ReplayAnswer | null => {
    const levers = ask.questions.find((one) => one.key === key)?.levers;
    return (levers && found?.answers.find((one) => same(one.levers, levers))?.replay) ?? null;
  };
  const all =
    found?.together &&
    found.answers.length === ask.questions.length &&
    ask.questions.every(({ levers }) => found.answers.some((one) => same(one.levers, levers)))
      ? found.together
      : null;
  const bad = Object.keys(ask.errors).length;
  const begin = () => {
    setTried(true);
    if (bad > 0 || ask.questions.length === 0) return;
    setAskedFor(`${from} ${to}`);
    replay.begin({
      from,
      to,
      questions: ask.questions.map(({ levers }) => levers),
      together: ask.questions.length > 1,
    });
  };
  const tick = (key: LeverKey, on: boolean) =>
    setTyped({ ...typed, ticked: on ? [...typed.ticked, key] : typed.ticked.filter((one) => one !== key) });
  const why = down
    ? 'No connection: the replay is done by the server.'
    : typed.ticked.length === 0
      ? 'Tick at least one.'
      : null;
  return (
    <View style={{ rowGap: 6 }} role="region" aria-label="What would shorten it">
      <Txt kind="heading" heading={2}>
        What would shorten it
      </Txt>
      <Txt kind="small" tone="ink2">
        Replayed over your own charges of these days, the filters left aside. An estimate, not a promise; in brackets
        the 80 % interval.
      </Txt>
      {found ? (
        <Txt>
          {found.now.enough
            ? `Lost hours a week, now ${lostWithInterval(found.now.lostHoursPerWeek)}, over ${found.now.charges} charges.`
            : tooFewWords(found.now)}
        </Txt>
      ) : null}
      {leverKeys.map((key) => (
        <LeverRow
          key={key}
          {...leverNames[key]}
          checked={typed.ticked.includes(key)}
          onChange={(on) => tick(key, on)}
          now={now}
          answer={answerOf(key)}
        >
          <LeverFields lever={key} typed={typed} errors={tried ? ask.errors : {}} onChange={setTyped} />
        </LeverRow>
      ))}
      <Rule gap={0} />
      {all?.enough ? (
        <View style={{ rowGap: 4, paddingVertical: 8 }}>
          <Txt bold>{`All ${ask.questions.length} ticked together`}</Txt>
          <Num value={lostWithInterval(all.lostHoursPerWeek)} unit="h lost a week" kind="numM" />
          <ReplayLine replay={all} now={now} />
        </View>
      ) : null}
      <ReplayState replay={replay} />
      {found && found.leftOut.length > 0 ? (
        <Txt kind="small" tone="ink2">
          {leftOutWords(found.leftOut)}
        </Txt>
      ) : null}
      {tried && bad > 0 ? (
        <Txt kind="small" tone="alarm" role="alert">
          {bad === 1 ? 'One field is missing.' : `${bad} fields are missing.`}
        </Txt>
      ) : null}
      {why ? (
        <Txt kind="small" tone="ink2" nativeID="shorten-why">
          {why}
        </Txt>
      ) : null}
      <Button
        title="Replay the charges"
        disabled={why !== null}
        {...(why ? { describedBy: 'shorten-why' } : {})}
        busy={replay.busy}
        onPress={begin}
      />
    </View>
  );
}
