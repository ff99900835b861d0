import type { ReactNode } from 'react';
import { View } from 'react-native';
import type { PlanBlockDto, PlanLookInDto } from '@/shared/contract/bench-plan';
import { clock } from '../format/clock';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { EN_DASH } from '../format/marks';
import { Button } from '../primitives/button';
import { Link } from '../primitives/link';
import { PressableLink } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { freeWords, minutesLeft } from '../work/fit-words';
import { wayOf, type DayEntry } from './day-entries';

/** A row of the day: its clock at the left, what there is to do beside it. */
export function DayRow({ at, past = false, children }: { at: number; past?: boolean; children: ReactNode }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  return (
    <View role="listitem" style={styles.row}>
      <Txt kind="numXS" tone={past ? 'ink3' : 'ink'} nowrap style={marks.hour12 ? styles.longClock : styles.clock}>
        {clock(at, zone, marks)}
      </Txt>
      <View style={styles.what}>{children}</View>
    </View>
  );
}

/** Where the clock stands in the list. */
export function NowRow({ at }: { at: number }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const words = clock(at, zone, marks);
  return (
    <View role="listitem" aria-label={`Now, ${words}`} style={styles.now}>
      <Txt kind="small" bold nowrap>{`now ${words}`}</Txt>
      <View style={styles.nowLine} />
    </View>
  );
}

/** Hands of a charge: clip on, swap, clip off, check, fit. The whole row opens what they are about. */
export function HandRow({ block, now, onGo }: { block: PlanBlockDto; now: number; onGo: (path: string) => void }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const [from, to] = [Date.parse(block.from), Date.parse(block.to)];
  const past = to <= now;
  const way = wayOf(block, now);
  const detail = [
    `${duration((to - from) / 1000, 'minute')}, to ${clock(to, zone, marks)}`,
    block.place,
    past ? 'over' : null,
  ]
    .filter(Boolean)
    .join(' · ');
  const words = (
    <>
      <Txt bold={!past} tone={past ? 'ink2' : 'ink'}>
        {block.title}
      </Txt>
      <Txt kind="small" tone={past ? 'ink3' : 'ink2'}>
        {detail}
      </Txt>
    </>
  );
  return (
    <DayRow at={from} past={past}>
      {way ? (
        <PressableLink
          href={way}
          onGo={() => onGo(way)}
          label={`${block.title}, ${detail}`}
          style={({ pressed }) => [styles.own, pressed && styles.pressed]}
        >
          {words}
        </PressableLink>
      ) : (
        <View style={styles.own}>{words}</View>
      )}
    </DayRow>
  );
}

/** A look-in: done by a tap, or by logging a reading. */
export function LookInRow({
  lookIn,
  next,
  now,
  busy,
  waits,
  problem,
  onDone,
  onGo,
}: {
  lookIn: PlanLookInDto;
  /** It is the next one of its charge: it can be done now. */
  next: boolean;
  now: number;
  busy: boolean;
  /** A visit waits on this device for the connection. */
  waits: boolean;
  problem: string | null;
  onDone: () => void;
  onGo: (path: string) => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const at = Date.parse(lookIn.doneAt ?? lookIn.dueAt);
  const done = lookIn.doneAt !== null;
  const late = !done && at < now - 60_000;
  const log = `/charges/${lookIn.chargeId}/log`;
  return (
    <DayRow at={at} past={done}>
      <View style={styles.line}>
        <View style={[styles.peg, done && styles.pegDone]} aria-hidden />
        <View style={styles.words}>
          <Txt bold={!done} tone={done ? 'ink2' : 'ink'}>{`Look in at ${lookIn.title}`}</Txt>
          <Txt kind="small" tone={done ? 'ink3' : late ? 'alarm' : 'ink2'} bold={late}>
            {[
              lookIn.channelName,
              done
                ? `done ${clock(at, zone, marks)}`
                : waits && next
                  ? 'done, waits for the connection'
                  : late
                    ? `${duration((now - at) / 1000, 'minute')} over`
                    : null,
            ]
              .filter(Boolean)
              .join(' · ')}
          </Txt>
        </View>
      </View>
      {problem ? (
        <Txt kind="small" bold tone="alarm" role="alert">
          {problem}
        </Txt>
      ) : null}
      {next ? (
        <View style={styles.acts}>
          <Button
            look="line"
            size="small"
            title="Looked in"
            label={`Looked in at ${lookIn.title}`}
            busy={busy}
            disabled={waits}
            onPress={onDone}
          />
          <Link title="Log a reading" label={`Log a reading of ${lookIn.title}`} href={log} onPress={() => onGo(log)} />
        </View>
      ) : null}
    </DayRow>
  );
}

/** A break. */
export function BreakRow({ entry, now }: { entry: Extract<DayEntry, { kind: 'break' }>; now: number }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  return (
    <DayRow at={entry.at} past={entry.to <= now}>
      <Txt tone="ink3" style={styles.plain}>{`Break, to ${clock(entry.to, zone, marks)}`}</Txt>
    </DayRow>
  );
}

/** Free time, dashed; what fits it stands in it. */
export function FreeRow({
  entry,
  now,
  children,
}: {
  entry: Extract<DayEntry, { kind: 'free' }>;
  now: number;
  children?: ReactNode;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const from = Math.max(entry.at, now);
  return (
    <DayRow at={entry.at}>
      <View style={styles.free}>
        <Txt bold>{freeWords(minutesLeft(entry.free, now))}</Txt>
        <Txt kind="small" tone="ink2">
          {[
            `${clock(from, zone, marks)}${EN_DASH}${clock(entry.to, zone, marks)}`,
            entry.free.waitOf ? `waiting for ${entry.free.waitOf.title}` : null,
          ]
            .filter(Boolean)
            .join(' · ')}
        </Txt>
        {children}
      </View>
    </DayRow>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: { flexDirection: 'row', columnGap: 12, paddingVertical: 6 },
  clock: { width: 46, paddingTop: 8 },
  longClock: { width: 70, paddingTop: 8 },
  what: { flex: 1, minWidth: 0, rowGap: 6 },
  own: { backgroundColor: colors.well, borderRadius: 4, paddingHorizontal: 12, paddingVertical: 8, minHeight: 48 },
  pressed: { opacity: 0.8 },
  plain: { paddingTop: 8, minHeight: 36 },
  free: {
    borderWidth: 1.5,
    borderStyle: 'dashed',
    borderColor: colors.edge,
    borderRadius: 4,
    paddingHorizontal: 12,
    paddingVertical: 8,
    rowGap: 2,
  },
  line: { flexDirection: 'row', alignItems: 'center', columnGap: 12, minHeight: 40 },
  words: { flex: 1, minWidth: 0 },
  peg: { width: 14, height: 14, borderRadius: 7, borderWidth: 2, borderColor: colors.ink },
  pegDone: { backgroundColor: colors.ink3, borderColor: colors.ink3 },
  acts: { flexDirection: 'row', alignItems: 'center', columnGap: 16 },
  now: { flexDirection: 'row', alignItems: 'center', columnGap: 8, paddingVertical: 4 },
  nowLine: { flex: 1, height: 2.5, backgroundColor: colors.ink },
}));
