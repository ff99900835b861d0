import { View } from 'react-native';
import type { MovePlaceDto, MovePlacesDto, PlacedDto } from '@/shared/contract/bench-plan';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { ChoiceList } from '../primitives/choice-row';
import { DateTimeField, type DayAndTime } from '../primitives/date-time-field';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { web } from '../theme/web-props';
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
  /** false where its name stands over it already. */
  titled?: boolean;
}

/** 'from 14:45, ready 17:25 (17:10–17:55), on time'; or why it cannot be done there. */
export function placeMeaning({ soonest, because }: MovePlaceDto, now: number, wording: Wording): string {
  if (!soonest) return because ?? 'It cannot be done there.';
  const from = moment(Date.parse(soonest.clipOnAt), wording.zone, now, wording.marks);
  const ready = readyWords({ ready: soonest.ready, dueAt: null }, now, wording);
  return `from ${from}, ${ready}, ${latenessWords(soonest.lateByMinutes)}`;
}

/** The charge that was picked: where it stands, the channels that can do it, the time to clip on, and what that brings. */
export function MoveChoice(props: MovePanelProps) {
  const { title, stands, dueAt, fixedBecause, now, onGo, chargeId, titled = true } = props;
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const due = dueAt === null ? null : `due ${moment(Date.parse(dueAt), zone, now, marks)}`;
  const live = `/charges/${chargeId}`;
  return (
    <View style={styles.stack}>
      <View style={styles.head}>
        {titled ? (
          <Txt kind="numM" heading={2}>
            {title}
          </Txt>
        ) : (
          <Txt tone="ink2">{stands ?? 'no channel yet'}</Txt>
        )}
        <Link title="Open the charge" href={live} onPress={() => onGo(live)} kind="small" />
      </View>
      <Txt tone="ink2">{[titled ? (stands ?? 'no channel yet') : null, due].filter(Boolean).join(', ')}</Txt>
      {fixedBecause !== null ? <Txt>{fixedBecause}</Txt> : <Places {...props} />}
    </View>
  );
}

function Places({
  places,
  placesProblem,
  candidate,
  placed,
  taken,
  typed,
  timeError,
  today,
  now,
  onChannel,
  onTyped,
  onStep,
  onRetry,
}: MovePanelProps) {
  const styles = useStyles();
  const formats = useFormats();
  if (!places)
    return placesProblem ? (
      <>
        <Txt tone="alarm" role="alert">
          {placesProblem}
        </Txt>
        <Button look="line" size="small" title="Try again" onPress={onRetry} />
      </>
    ) : (
      <View aria-busy style={styles.looking}>
        <Txt tone="ink2">Looking for its places.</Txt>
      </View>
    );
  return (
    <>
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
          <View {...web({ 'aria-live': 'polite' })} style={styles.outcome}>
            <Txt bold>{readyWords({ ready: placed.ready, dueAt: null }, now, formats)}</Txt>
            <Txt bold={placed.lateByMinutes > 0} tone={placed.lateByMinutes > 0 ? 'alarm' : 'ink2'}>
              {latenessWords(placed.lateByMinutes)}
            </Txt>
            {taken ? <Txt kind="small">{taken}</Txt> : null}
          </View>
        </>
      ) : null}
    </>
  );
}

/** Why it cannot be moved yet; null: it can. */
function waitsFor({ offline, candidate, placed, other }: MovePanelProps): string | null {
  if (offline) return 'Moving it needs the connection.';
  if (candidate === null) return 'Choose a channel.';
  if (!placed) return 'It cannot be done on that channel. Choose another one.';
  return other ? null : 'It stands there now. Choose another channel or time.';
}

/** The buttons under it: moved there, or left where it is; with what stands against it. */
export function MoveActs(props: MovePanelProps) {
  const { title, fixedBecause, places, placed, timeError, now, busy, problem, onMove, onLeave } = props;
  const styles = useStyles();
  const formats = useFormats();
  const leave = (
    <Button
      look="line"
      size="small"
      title={fixedBecause === null ? 'Leave it where it is' : 'Close'}
      onPress={onLeave}
    />
  );
  if (fixedBecause !== null || !places) return leave;
  const why = waitsFor(props);
  const to = placed ? placeWords(placed, now, formats) : null;
  return (
    <View style={styles.acts}>
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
        title={to ? `Move it to ${to}` : 'Move it'}
        label={to ? `Move ${title} to ${to}` : `Move ${title}`}
        busy={busy}
        disabled={why !== null || timeError !== null}
        describedBy={why ? 'bench-move-why' : undefined}
        onPress={onMove}
      />
      {leave}
    </View>
  );
}

/** Both under each other: the side column of the desk. */
export const MovePanel = (props: MovePanelProps) => {
  const styles = useStyles();
  return (
    <View role="region" aria-label={`Move ${props.title}`} style={styles.stack}>
      <MoveChoice {...props} />
      <MoveActs {...props} />
    </View>
  );
};

/** In a sheet the buttons stay at its foot while the places scroll. */
export const MoveSheet = (props: MovePanelProps) => (
  <BottomSheet
    open
    title={props.fixedBecause === null ? `Move ${props.title}` : props.title}
    onClose={props.onLeave}
    actions={<MoveActs {...props} />}
  >
    <MoveChoice {...props} titled={false} />
  </BottomSheet>
);

const useStyles = makeStyles(() => ({
  head: {
    flexDirection: 'row',
    justifyContent: 'space-between',
    alignItems: 'center',
    columnGap: 12,
    flexWrap: 'wrap',
  },
  stack: { rowGap: 10 },
  acts: { rowGap: 8 },
  looking: { minHeight: 48, justifyContent: 'center' },
  steps: { flexDirection: 'row', columnGap: 8 },
  outcome: { rowGap: 1 },
}));
