import { useState } from 'react';
import { isConflict, sentenceOf } from '@/shared/client/api-problem';
import { useMoveCharge, useMovePlaces } from '@/shared/client/bench-plan';
import type { BenchChangeDto, BenchPlanDto } from '@/shared/contract/bench-plan';
import {
  ghostOf,
  heldBy,
  isOther,
  onChannel,
  placedAt,
  soonestOn,
  soonestPlace,
  stepChannel,
  stepTime,
  subjectOf,
  type Candidate,
} from '@/shared/ui/bench-plan/move-candidate';
import { moment } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { parseTimeOfDay, timeOfDayText } from '@/shared/ui/format/parse';
import { dayOf, instantOfDay, localTime } from '@/shared/ui/format/zone';
import type { DayAndTime } from '@/shared/ui/primitives/date-time-field';
import type { WebKeyEvent } from '@/shared/ui/theme/web-props';

interface Picked {
  chargeId: string;
  /** null: as it stands, until its places are known. */
  candidate: Candidate | null;
  /** As typed; null: as the candidate says. */
  typed: DayAndTime | null;
}

/**
 * One charge on its way to another place: picked, its places asked for, a channel and a time chosen, moved. A refusal
 * keeps what was chosen and says what stands there now.
 *
 * @param moved after the server has taken it
 * @param renew somebody else was first: read the plan again
 */
export function useMove(
  plan: BenchPlanDto | undefined,
  now: number,
  moved: (change: BenchChangeDto, chargeId: string) => void,
  renew: () => void,
) {
  const { zone, marks } = useFormats();
  const [picked, setPicked] = useState<Picked | null>(null);
  const write = useMoveCharge();
  const subject = plan && picked ? subjectOf(plan, picked.chargeId) : null;
  const movable = subject !== null && subject.fixedBecause === null;
  const query = useMovePlaces(movable ? subject.chargeId : '');
  const places = movable && query.data?.chargeId === subject.chargeId ? query.data : null;
  const stands = subject?.stands ?? null;
  const first = places ? soonestPlace(places) : null;
  const candidate =
    picked?.candidate ??
    stands ??
    (first?.soonest ? { channelId: first.channelId, clipOn: Date.parse(first.soonest.clipOnAt) } : null);
  const placed = candidate && places ? placedAt(candidate, places, subject?.dueAt ?? null) : null;
  const other = candidate !== null && isOther(candidate, stands);

  const said = (instant: number): DayAndTime => {
    const { hour, minute } = localTime(instant, zone);
    return { day: dayOf(instant, zone), time: timeOfDayText(hour * 60 + minute) };
  };
  const typed = picked?.typed ?? (candidate ? said(candidate.clipOn) : { day: dayOf(now, zone), time: '' });
  const soonest = candidate && places ? soonestOn(places, candidate.channelId) : null;
  const timeError = ((): string | null => {
    if (!picked?.typed) return null;
    const minutes = parseTimeOfDay(picked.typed.time);
    if (minutes === null) return 'This is no time. Type it like 14:05.';
    // The soonest of a place has seconds, what is typed has none.
    if (
      soonest &&
      instantOfDay(picked.typed.day, minutes, zone) < Math.floor(Date.parse(soonest.clipOnAt) / 60_000) * 60_000
    )
      return `The soonest there is ${moment(Date.parse(soonest.clipOnAt), zone, now, marks)}.`;
    return null;
  })();

  const hold =
    candidate && placed && subject && plan && other ? heldBy(candidate, subject.chargeId, placed, plan) : null;
  const channelName = plan?.channels.find(({ id }) => id === candidate?.channelId)?.name ?? '';
  const at = (instant: number) => moment(instant, zone, now, marks);

  const leave = () => {
    write.reset();
    setPicked(null);
  };
  const aim = (next: Candidate | null) => {
    write.reset();
    if (next && picked) setPicked({ chargeId: picked.chargeId, candidate: next, typed: null });
  };
  const send = (chargeId: string, rev: number, to: Candidate) =>
    write.mutate(
      { chargeId, rev, channelId: to.channelId, clipOnAt: new Date(to.clipOn).toISOString() },
      {
        onSuccess: (change) => {
          setPicked(null);
          moved(change, chargeId);
        },
        onError: (error) => {
          if (!isConflict(error)) return;
          renew();
          void query.refetch();
        },
      },
    );
  const move = () => {
    if (!subject || !candidate || !placed || !other || timeError !== null || write.isPending) return;
    send(subject.chargeId, places?.rev ?? subject.rev, candidate);
  };

  return {
    subject,
    places,
    placesProblem: query.isError ? sentenceOf(query.error) : null,
    retryPlaces: () => void query.refetch(),
    candidate,
    placed,
    other,
    typed,
    timeError,
    taken: hold ? `${hold.title} has ${channelName} from ${at(hold.from)} to ${at(hold.to)}.` : null,
    ghost: subject?.charge && candidate && placed && other ? ghostOf(subject.charge, candidate, placed) : null,
    busy: write.isPending,
    problem: write.isError
      ? isConflict(write.error) && write.error.status === 412
        ? `${sentenceOf(write.error)} The plan shows what is there now: look again, then decide.`
        : sentenceOf(write.error)
      : null,
    pick: (chargeId: string) => {
      write.reset();
      setPicked((last) => (last?.chargeId === chargeId ? null : { chargeId, candidate: null, typed: null }));
    },
    leave,
    toChannel: (channelId: string) => {
      const soon = places ? soonestOn(places, channelId) : null;
      if (soon) aim({ channelId, clipOn: Date.parse(soon.clipOnAt) });
    },
    step: (step: 1 | -1) => aim(candidate && places ? stepTime(candidate, places, step) : null),
    type: (next: DayAndTime) => {
      if (!picked || !candidate) return;
      write.reset();
      const minutes = parseTimeOfDay(next.time);
      const told = minutes === null ? candidate.clipOn : instantOfDay(next.day, minutes, zone);
      const soon = soonest ? Date.parse(soonest.clipOnAt) : told;
      // The minute of the soonest is the soonest, seconds and all.
      const clipOn = soon >= told && soon < told + 60_000 ? soon : told;
      setPicked({ ...picked, candidate: { ...candidate, clipOn }, typed: next });
    },
    move,
    /** A pointer draws the charge along the line: where it is over. */
    drag: (chargeId: string, to: Candidate) => {
      const known = places?.chargeId === chargeId ? onChannel(places, to.channelId, to.clipOn) : null;
      setPicked({ chargeId, candidate: known ?? to, typed: null });
    },
    /** It was let go there: moved, where its places are known and this is one; else it waits to be confirmed. */
    drop: (chargeId: string, to: Candidate) => {
      const known = places?.chargeId === chargeId ? onChannel(places, to.channelId, to.clipOn) : null;
      if (known && places && isOther(known, stands)) send(chargeId, places.rev, known);
    },
    /** Arrow keys move the picked charge, Enter takes it, Escape leaves it where it is. */
    key: (chargeId: string, event: WebKeyEvent) => {
      if (picked?.chargeId !== chargeId || event.ctrlKey || event.metaKey || event.altKey) return;
      const steps: Record<string, () => void> = {
        ArrowLeft: () => aim(candidate && places ? stepTime(candidate, places, -1) : null),
        ArrowRight: () => aim(candidate && places ? stepTime(candidate, places, 1) : null),
        ArrowUp: () => aim(candidate && places ? stepChannel(candidate, places, -1) : null),
        ArrowDown: () => aim(candidate && places ? stepChannel(candidate, places, 1) : null),
        Escape: leave,
        ...(other ? { Enter: move } : {}),
      };
      const act = steps[event.key];
      if (!act) return;
      event.preventDefault();
      act();
    },
    /** Read out while the keys move it: 'B1 at 14:00, ready 17:05, on time'. */
    heard:
      placed && other
        ? `${placed.channelNames.join(', ')} at ${at(Date.parse(placed.clipOnAt))}, ready ${at(Date.parse(placed.ready.likely))}, ${placed.lateByMinutes > 0 ? `${placed.lateByMinutes} min late` : 'on time'}`
        : '',
  };
}
export type Move = ReturnType<typeof useMove>;
