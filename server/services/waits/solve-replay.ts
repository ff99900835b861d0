/** Replays of a history, in the thread of the waits. */
import { channelsNeeded, replayCharges } from '@/calc/index';
import type { OpenMinutes, RecordedCharge, ReplayInput, ReplayLevers, ReplayResult } from '@/calc/waits/waits-types';
import type { ReplayAnswer, TooFewDto } from '@/shared/contract/waits-replay';
import { presentSpans, type SpanMs } from '../presence';
import type { HistoryCharge, ReplayChange, ReplayHistory } from './replay-history';
import { replayModel, type ReplayModel } from './replay-model';
import { jobControl, type JobControl } from './job-control';
import type { ChannelsAnswer, ChannelsTask, WhatIfAnswer, WhatIfTask } from './waits-tasks';

const MINUTE_MS = 60_000;
/** Replayed charges may wait for so long after the last one came, ms. */
const AFTER_MS = 60 * 86_400_000;
/** Of the intervals' draws: the same history gives the same intervals. */
const SEED = 7;

/** Each question alone, and all together; null: it was told to stop. */
export function solveWhatIf({ history, questions, together, control }: WhatIfTask): WhatIfAnswer | null {
  const ground = groundOf(history);
  const sets: ReplayChange[][] = [[], ...questions.map((one) => [one]), ...(together ? [questions] : [])];
  const told = jobControl(control);
  const answers: ReplayAnswer[] = [];
  for (const [place, changes] of sets.entries()) {
    const { input, levers } = asked(ground, changes);
    const found = replayCharges(input, levers, part(told, place, sets.length));
    if (found === null || told.isStopped()) return null;
    answers.push(found.enough ? replayDto(found) : found);
    told.tell((place + 1) / sets.length);
  }
  const [now, ...others] = answers;
  return { now: now!, answers: others.slice(0, questions.length), together: together ? others.at(-1)! : null };
}

/** The least channels of a kind for a wished wait; null: it was told to stop. */
export function solveChannels({ history, channelKind, wishedP90Hours, control }: ChannelsTask): ChannelsAnswer | null {
  const { input, levers } = asked(groundOf(history), []);
  const told = jobControl(control);
  const found = channelsNeeded(input, levers, { kind: channelKind, wishedP90Hours }, { shouldStop: told.isStopped });
  if (found === null || told.isStopped()) return null;
  if (!found.enough) return found satisfies TooFewDto;
  const { channels, roughChannels, replay } = found;
  return { enough: true, channels, roughChannels, replay: replayDto(replay) };
}

function replayDto({ count, unplaced, lostHoursPerWeek, p50WaitHours, p90WaitHours }: ReplayResult): ReplayAnswer & {
  enough: true;
} {
  return { enough: true, charges: count, unplaced, lostHoursPerWeek, p50WaitHours, p90WaitHours };
}

/** Progress of one of several replays. */
const part = (told: JobControl, place: number, of: number) => ({
  progress: (done: number, all: number) => told.tell((place + done / Math.max(1, all)) / of),
  shouldStop: told.isStopped,
});

interface Ground {
  history: ReplayHistory;
  model: ReplayModel;
  charges: RecordedCharge[];
  byId: ReadonlyMap<string, HistoryCharge>;
  open: OpenMinutes[];
}

function groundOf(history: ReplayHistory): Ground {
  const { charges, hours, lookInMinutes, unattended } = history;
  const first = charges.reduce((least, one) => Math.min(least, one.bookedAt ?? one.askedAt, one.askedAt), Infinity);
  const last = charges.reduce((most, one) => Math.max(most, one.readyAt), -Infinity);
  const origin = charges.length === 0 ? 0 : first;
  const spans = charges.length === 0 ? [] : presentSpans(hours, null, origin, last + AFTER_MS);
  const minutes = (at: number): number => (at - origin) / MINUTE_MS;
  const watched = guardedSpans(spans, lookInMinutes);
  return {
    history,
    model: replayModel(history),
    byId: new Map(charges.map((one) => [one.id, one])),
    open: spans.map(({ from, to }) => ({ fromMinutes: minutes(from), toMinutes: minutes(to) })),
    charges: charges.map((one) => ({
      id: one.id,
      arrivalMinutes: minutes(one.askedAt),
      bookedMinutes: one.bookedAt === null ? null : minutes(one.bookedAt),
      dueMinutes: one.dueAt === null ? null : minutes(one.dueAt),
      kind: one.kind,
      actualMinutes: (one.heldToAt - one.heldFromAt) / MINUTE_MS,
      afterMinutes: Math.max(0, one.readyAt - one.heldToAt) / MINUTE_MS,
      usedShare: one.usedShare,
      ranUnwatched: unattended || !within(watched, one.heldFromAt, one.heldToAt),
    })),
  };
}

/** Presence with the absences filled that are no longer than the look-in interval. */
function guardedSpans(spans: readonly SpanMs[], lookInMinutes: number): SpanMs[] {
  const joined: SpanMs[] = [];
  for (const span of spans) {
    const last = joined.at(-1);
    if (last && span.from - last.to <= lookInMinutes * MINUTE_MS) last.to = span.to;
    else joined.push({ ...span });
  }
  return joined;
}

/** Whether one of the ascending stretches holds it whole. */
function within(spans: readonly SpanMs[], from: number, to: number): boolean {
  let [low, high] = [0, spans.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (spans[middle]!.to < to) low = middle + 1;
    else high = middle;
  }
  const span = spans[low];
  return span !== undefined && span.from <= from;
}

/** The replay's input under some changes; the model is asked with them only where the replay asks for what would be. */
function asked({ history, model, charges, byId, open }: Ground, changes: readonly ReplayChange[]) {
  const looks = changes.flatMap(({ lookInMinutes }) => lookInMinutes ?? []);
  const levers: ReplayLevers = {
    startAtBooking: changes.some((one) => one.startAtBooking),
    overnightAllowed: changes.some((one) => one.overnightAllowed),
    ...(looks.length > 0 ? { lookInMinutes: Math.min(...looks) } : {}),
  };
  const channels = history.kinds.map(({ count }) => count);
  for (const { moreOfKind } of changes) if (moreOfKind !== undefined) channels[moreOfKind]! += 1;
  const input: ReplayInput = {
    charges,
    channels,
    open,
    lookInMinutes: history.lookInMinutes,
    durationMinutes: (one, kind, under) => model.minutes(byId.get(one.id)!, kind, under === levers ? changes : []),
    seed: SEED,
  };
  return { input, levers };
}
