import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import type { ReplayAnswer, ReplayDto } from '@/shared/contract/waits-replay';
import { ShareBar } from '../charts/share-bar';
import { CheckBox } from '../primitives/check-box';
import { Txt } from '../primitives/txt';
import { lostWithInterval, tooFewWords, waitWithInterval } from './replay-words';

/** One thing that could be changed: tick box, what it means, what it needs, and what it would have done. */
export function LeverRow({
  title,
  meaning,
  checked,
  onChange,
  now,
  answer,
  children,
}: {
  title: string;
  meaning: string;
  checked: boolean;
  onChange: (checked: boolean) => void;
  /** Lost hours of a week as things are. */
  now: number | null;
  /** Null: it was not replayed yet. */
  answer: ReplayAnswer | null;
  /** Its fields; shown while it is ticked. */
  children?: ReactNode;
}) {
  return (
    <View>
      <CheckBox title={title} meaning={meaning} checked={checked} onChange={onChange} />
      {checked && (children || answer) ? (
        <View style={styles.inside}>
          {children}
          {answer === null ? null : answer.enough ? (
            <ReplayLine replay={answer} now={now} />
          ) : (
            <Txt tone="ink2">{tooFewWords(answer)}</Txt>
          )}
        </View>
      ) : null}
    </View>
  );
}

/** Lost hours against now as a bar and a number, and the wait of one charge, each with its interval. */
export function ReplayLine({ replay, now }: { replay: ReplayDto; now: number | null }) {
  const lost = replay.lostHoursPerWeek;
  return (
    <View style={styles.result}>
      <View style={styles.bar}>
        <ShareBar share={now !== null && now > 0 ? lost.value / now : 0} />
        <Txt kind="numS" align="right" nowrap>
          {`${lostWithInterval(lost)} h`}
        </Txt>
      </View>
      <Txt kind="small" tone="ink2">
        {`One charge: half under ${waitWithInterval(replay.p50WaitHours)}, 9 of 10 under ${waitWithInterval(replay.p90WaitHours)}.`}
      </Txt>
      {replay.unplaced > 0 ? (
        <Txt kind="small" tone="ink2">
          {`${replay.unplaced} could not begin under these rules and are in no figure.`}
        </Txt>
      ) : null}
    </View>
  );
}

const styles = StyleSheet.create({
  inside: { paddingLeft: 38, paddingBottom: 12, rowGap: 10 },
  result: { rowGap: 4 },
  bar: { flexDirection: 'row', alignItems: 'center', columnGap: 12, minHeight: 26 },
});
