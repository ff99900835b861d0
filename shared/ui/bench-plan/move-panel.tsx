import { View } from 'react-native';
import type { MovePlaceDto, MovePlacesDto, PlacedDto } from '@/shared/contract/bench-plan';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Button } from '../primitives/button';
import { ChoiceList } from '../primitives/choice-row';
import { DateTimeField, type DayAndTime } from '../primitives/date-time-field';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { latenessWords, placeWords, readyWords, type Wording } from './charge-words';
import type { Candidate } from './move-candidate';

export interface MovePanelProps {
  title: string;
  chargeId: string;
  /** 'A1 at 14:45'; null: it has no channel yet. */
  stands: string | null;
  dueAt: string | null;
  /** Sentence why it cannot be moved; null: it can. */
  fixedBecause: string | null;
  /** null while they are asked for. */
  places: MovePlacesDto | null;
  /** Why they could not be read. */
  placesProblem: string | null;
  candidate: Candidate | null;
  placed: PlacedDto | null;
  /** The candidate is another place than the present one. */
  other: boolean;
  /** 'R-2421 has B1 from 15:30 to 17:40.' */
  taken: string | null;
  typed: DayAndTime;
  timeError: string | null;
  today: string;
  now: number;
  busy: boolean;
  offline: boolean;
  problem: string | null;
  onChannel: (channelId: string) => void;
  onTyped: (typed: DayAndTime) => void;
  onStep: (step: 1 | -1) => void;
  onRetry: () => void;
  onMove: () => void;
  onLeave: () => void;
  onGo: (path: string) => void;
}

/** 'from 14:45, ready 17:25 (17:10–17:55), on time'; or why it cannot be done there. */
export function placeMeaning({ soonest, because }: MovePlaceDto, now: number, wording: Wording): string {
  if (!soonest) return because ?? 'It cannot be done there.';
  const from = moment(Date.parse(soonest.clipOnAt), wording.zone, now, wording.marks);
  const ready = readyWords({ ready: soonest.ready, dueAt: null }, now, wording);
  return `from ${from}, ${ready}, ${latenessWords(soonest.lateByMinutes)}`;
}

/** The charge that was picked: the channels that can do it, the time to clip on, and what that brings. */
export function MovePanel(props: MovePanelProps) {
  const { title, stands, dueAt, fixedBecause, now, onLeave, onGo, chargeId } = props;
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const due = dueAt === null ? null : `due ${moment(Date.parse(dueAt), zone, now, marks)}`;
  return (
    <View role="region" aria-label={`Move ${title}`} style={styles.panel}>
      <View style={styles.head}>
        <Txt kind="numM" heading={2}>
          {title}
        </Txt>
        <Link
          title="Open the charge"
          href={`/charges/${chargeId}`}
          onPress={() => onGo(`/charges/${chargeId}`)}
          kind="small"
        />
      </View>
      <Txt tone="ink2">{[stands ?? 'no channel yet', due].filter(Boolean).join(', ')}</Txt>
      {fixedBecause !== null ? <Txt>{fixedBecause}</Txt> : <Places {...props} />}
      <Button
        look="line"
        size="small"
        title={fixedBecause === null ? 'Leave it where it is' : 'Close'}
        onPress={onLeave}
      />
    </View>
  );
}

function Places({
  title,
  places,
  placesProblem,
  candidate,
  placed,
  other,
  taken,
  typed,
  timeError,
  today,
  now,
  busy,
  offline,
  problem,
  onChannel,
  onTyped,
  onStep,
  onRetry,
  onMove,
}: MovePanelProps) {
  const styles = useStyles();
  const formats = useFormats();
  if (!places)
    return placesProblem ? (
      <View style={styles.stack}>
        <Txt tone="alarm" role="alert">
          {placesProblem}
        </Txt>
        <Button look="line" size="small" title="Try again" onPress={onRetry} />
      </View>
    ) : (
      <View aria-busy style={styles.looking}>
        <Txt tone="ink2">Looking for its places.</Txt>
      </View>
    );
  const why = offline
    ? 'Moving it needs the connection.'
    : candidate === null
      ? 'Choose a channel.'
      : !placed
        ? 'It cannot be done on that channel. Choose another one.'
        : !other
          ? 'It stands there now. Choose another channel or time.'
          : null;
  const disabled = why !== null || timeError !== null;
  return (
    <View style={styles.stack}>
      <ChoiceList
        label="Channel"
        outset={0}
        value={candidate?.channelId ?? null}
        choices={places.places.map((place) => ({
          value: place.channelId,
          title: place.channelName,
          meaning: placeMeaning(place, now, formats),
          disabled: place.soonest === null,
        }))}
        onChange={onChannel}
      />
      {candidate && placed ? (
        <>
          <DateTimeField
            label="Clip on"
            value={typed}
            onChange={onTyped}
            today={today}
            error={timeError ?? undefined}
          />
          <View style={styles.steps}>
            <Button
              look="line"
              size="small"
              title="Earlier"
              label="A quarter hour earlier"
              onPress={() => onStep(-1)}
              grow
            />
            <Button
              look="line"
              size="small"
              title="Later"
              label="A quarter hour later"
              onPress={() => onStep(1)}
              grow
            />
          </View>
          <View {...({ 'aria-live': 'polite' } as object)} style={styles.outcome}>
            <Txt bold>{readyWords({ ready: placed.ready, dueAt: null }, now, formats)}</Txt>
            <Txt bold={placed.lateByMinutes > 0} tone={placed.lateByMinutes > 0 ? 'alarm' : 'ink2'}>
              {latenessWords(placed.lateByMinutes)}
            </Txt>
            {taken ? <Txt kind="small">{taken}</Txt> : null}
          </View>
        </>
      ) : null}
      {problem ? (
        <Txt bold tone="alarm" role="alert">
          {problem}
        </Txt>
      ) : null}
      {why ? (
        <View nativeID="bench-move-why">
          <Txt kind="small" tone="ink2">
            {why}
          </Txt>
        </View>
      ) : null}
      <Button
        size="small"
        title={placed ? `Move it to ${placeWords(placed, now, formats)}` : `Move ${title}`}
        label={placed ? `Move ${title} to ${placeWords(placed, now, formats)}` : undefined}
        busy={busy}
        disabled={disabled}
        describedBy={why ? 'bench-move-why' : undefined}
        onPress={onMove}
      />
    </View>
  );
}

const useStyles = makeStyles(() => ({
  panel: { rowGap: 8 },
  head: {
    flexDirection: 'row',
    justifyContent: 'space-between',
    alignItems: 'center',
    columnGap: 12,
    flexWrap: 'wrap',
  },
  stack: { rowGap: 10 },
  looking: { minHeight: 48, justifyContent: 'center' },
  steps: { flexDirection: 'row', columnGap: 8 },
  outcome: { rowGap: 1 },
}));
