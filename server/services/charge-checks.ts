import type { EntityManager } from 'typeorm';
import { refuseCharge } from '@/calc/plan/refuse-charge';
import type { Refusal, SpareState } from '@/calc/plan-types';
import { checkCodes, type CheckCode, type CheckItemDto } from '@/shared/contract/charge';
import type { CheckAnswer } from '../entities/check-answer';
import type { SpareReading } from '../entities/spare-reading';
import { findLastSpareReading } from '../repositories/spares.repository';
import { personRef } from './alert-dto';
import {
  attendanceWords,
  ceilingWords,
  conditionWords,
  isolationWords,
  locked,
  polarityWords,
  temperatureWords,
  titleOfCheck,
  ventilationWords,
  type CheckWords,
} from './charge-check-items';
import type { ChargeFile } from './charge-file';
import { channelRefusals } from './channel-refusals';
import { isWaitingToStart } from './charge-stages';
import { celsiusText, clockText } from './charge-words';
import { toInstant } from './instants';
import { spareState } from './plan-parameters';
import { readsOtherwise } from './reads-otherwise';

export interface CheckSheet {
  items: CheckItemDto[];
  /** What the numbers rule out now, each with its sentence. */
  refusals: Refusal[];
  /** The reading the locked answers come from. */
  reading: SpareReading | null;
  /** Sentence where the spare no longer reads what it was planned with; null: it does. */
  moved: string | null;
}

/** Which check shows what the numbers rule out. */
const checkOfRefusal: Record<Refusal['code'], CheckCode> = {
  'deep-discharged': 'condition',
  condition: 'condition',
  quarantined: 'condition',
  reversed: 'polarity',
  temperature: 'temperature',
  ceiling: 'ceiling',
  numbers: 'ceiling',
  'target-over-limit': 'ceiling',
  'target-under-limit': 'ceiling',
};

/**
 * The checks of a charge as they stand. Before the start they are made anew from the spare's present state, so that what
 * has changed since the plan counts; afterwards they show what was answered.
 */
export async function checkSheet(
  manager: EntityManager,
  file: ChargeFile,
  answers: readonly CheckAnswer[],
  now: number,
): Promise<CheckSheet> {
  const waiting = isWaitingToStart(file.charge.stage);
  const last = new Map(answers.filter((answer) => answer.replacedAt === null).map((answer) => [answer.code, answer]));
  const stale = (code: CheckCode): boolean => waiting && isStale(last.get(code), now);
  const present = new Map([...last].filter(([code]) => !stale(code)));
  const reading = await findLastSpareReading(manager, file.charge.workshopId, file.charge.spareId);
  const state = waiting && reading !== null ? readState(file, reading, now) : null;
  const refusals = state === null ? [] : presentRefusals(file, state);
  // Up to the start the meter is held against what it showed last; afterwards the plan's numbers stand.
  const groupVolts = state?.groupVolts ?? file.charge.frozen.spare.groupVolts;
  const words = (code: CheckCode): CheckWords => {
    const answer = present.get(code);
    if (!waiting && code === 'temperature' && answer?.note)
      return locked('data', code, answer.note, fromReading(file, answer, now));
    const refusal = refusals.find((one) => checkOfRefusal[one.code] === code);
    if (refusal && code !== 'temperature')
      return locked('ruled-out', code, refusal.text, 'Ruled out by the numbers. Locked.');
    const asked = wordsOf(file, code, groupVolts, reading, waiting, now);
    return stale(code) && asked.by === 'person' ? askedAgain(asked, file, last.get(code)!, now) : asked;
  };
  return {
    items: checkCodes.map((code) => itemOf(file, code, words(code), present.get(code) ?? null, reading)),
    refusals,
    reading,
    moved: state === null || reading === null ? null : movedSince(file, reading, state),
  };
}

/** Answers that tell how things stood; the others tell what was set, and stay. */
const passing: ReadonlySet<CheckCode> = new Set([
  'isolation',
  'polarity',
  'condition',
  'temperature',
  'attendance',
] satisfies CheckCode[]);
/** A shift: who answered then is gone, and what was seen may be otherwise by now, ms. Common practice. */
const ANSWER_GOOD_MS = 12 * 3_600_000;

const isStale = (answer: CheckAnswer | undefined, now: number): boolean =>
  answer !== undefined && passing.has(answer.code) && now - answer.at > ANSWER_GOOD_MS;

/** The question once more, with why. The old answer stays with the charge. */
function askedAgain(words: CheckWords, { people, workshop }: ChargeFile, answer: CheckAnswer, now: number): CheckWords {
  const who = people.get(answer.personId)?.name ?? 'Somebody';
  const when = clockText(answer.at, workshop.zone, now);
  return { ...words, detail: `${words.detail} ${who} answered ${when}, over 12\u00a0h ago: look again.` };
}

/** 'Answered from the reading at 13:37 by Ines Marlow. Locked.' */
function fromReading(file: ChargeFile, { personId, at }: Pick<SpareReading, 'personId' | 'at'>, now: number): string {
  const who = personRef(file.people, personId)?.name ?? 'somebody';
  return `Answered from the reading at ${clockText(at, file.workshop.zone, now)} by ${who}. Locked.`;
}

function itemOf(
  file: ChargeFile,
  code: CheckCode,
  words: CheckWords,
  answer: CheckAnswer | null,
  reading: SpareReading | null,
): CheckItemDto {
  // A locked check has no answer to change. The temperature was read by somebody; other numbers answer for nobody.
  const given = words.by === 'person' ? answer : null;
  const answered = words.by === 'data' && code === 'temperature' ? (answer?.note ? answer : reading) : given;
  return {
    code,
    ...words,
    answer: words.by === 'data' ? 'yes' : words.by === 'ruled-out' ? 'no' : (given?.answer ?? null),
    answeredBy: personRef(file.people, answered?.personId ?? null),
    answeredAt: answered === null ? null : toInstant(answered.at),
    note: given?.note ?? null,
  };
}

/** The spare as its last reading has it, that meter's known offset taken off. */
const readState = ({ spare, type, meters }: ChargeFile, reading: SpareReading, now: number): SpareState =>
  spareState(spare, type, reading, meters.get(reading.meterId ?? '') ?? null, now);

/** A reading newer than the plan's that says something else than the plan was made from. */
const movedSince = ({ charge }: ChargeFile, reading: SpareReading, state: SpareState): string | null =>
  reading.at > charge.frozen.spareReadAt
    ? readsOtherwise('It', charge.frozen.spare.groupVolts, state.groupVolts, charge.toleranceVolts)
    : null;

/** What the spare's present state and its last reading rule out, with the limits the charge was planned with. */
function presentRefusals(file: ChargeFile, state: SpareState): Refusal[] {
  const { frozen } = file.charge;
  const { minChargeCelsius: least, maxChargeCelsius: most } = frozen.module;
  const found = refuseCharge({
    module: frozen.module,
    spare: state,
    target: frozen.target,
    channels: frozen.channels,
    resistors: frozen.resistors,
    neighbour: frozen.neighbour,
    workshop: frozen.workshop,
    readyByS: null,
    clipOnAtS: 0,
    // Nobody has read it lately: then a person answers, and the room's temperature rules nothing out.
    celsius: (least + most) / 2,
    seed: frozen.seed,
  });
  return [...found, ...channelRefusals(file)];
}

function wordsOf(
  file: ChargeFile,
  code: CheckCode,
  groupVolts: readonly number[],
  reading: SpareReading | null,
  waiting: boolean,
  now: number,
): CheckWords {
  switch (code) {
    case 'isolation':
      return isolationWords();
    case 'polarity':
      return polarityWords(file, groupVolts);
    case 'condition':
      return conditionWords();
    case 'temperature':
      return temperatureOf(file, reading, waiting, now);
    case 'ceiling':
      return ceilingWords(file, file.channels.get(file.charge.option.steps[0]?.channelIds[0] ?? '') ?? null);
    case 'ventilation':
      return ventilationWords();
    case 'attendance':
      return attendanceWords(file, file.charge.startedAt ?? now);
  }
}

function temperatureOf(file: ChargeFile, reading: SpareReading | null, waiting: boolean, now: number): CheckWords {
  const { charge, workshop } = file;
  const { minChargeCelsius: least, maxChargeCelsius: most } = charge.frozen.module;
  const window = `${Math.round(least)}–${celsiusText(most)}`;
  const celsius = reading === null || !waiting ? null : readState(file, reading, now).celsius;
  if (celsius === null || reading === null) return temperatureWords(window);
  const says = `${celsiusText(celsius)}, allowed ${window}`;
  const at = clockText(reading.at, workshop.zone, now);
  if (celsius < least || celsius > most) {
    const wayOut = celsius < least ? `Warm it to ${celsiusText(least)}` : `Let it cool to ${celsiusText(most)}`;
    return locked(
      'ruled-out',
      'temperature',
      says,
      `Ruled out by the reading at ${at}. Locked. ${wayOut}, then read it again.`,
    );
  }
  return locked('data', 'temperature', says, fromReading(file, reading, now));
}

/** Sentence that keeps the timer from starting because of the checks; null: all of them let it start. */
export function sheetBlock(
  sheet: CheckSheet,
): { code: 'ruled_out' | 'spare_moved' | 'checks_open'; text: string } | null {
  const out = sheet.items.find((item) => item.by === 'ruled-out');
  if (out) {
    const refusal = sheet.refusals.find((one) => checkOfRefusal[one.code] === out.code);
    const why = refusal?.text ?? `${titleOfCheck(out.code)}: ${out.question}.`;
    const then = out.code === 'temperature' ? ' Then read it again.' : '';
    return { code: 'ruled_out', text: `${why}${then} That cannot be ticked away.` };
  }
  if (sheet.moved !== null) return { code: 'spare_moved', text: sheet.moved };
  const denied = sheet.items.find((item) => item.answer === 'no');
  if (denied)
    return {
      code: 'ruled_out',
      text: `${denied.title}: “${denied.no}”. Put it right, then change the answer.`,
    };
  const open = sheet.items.filter((item) => item.answer === null).length;
  if (open === 0) return null;
  return {
    code: 'checks_open',
    text: `${open} answer${open === 1 ? '' : 's'} still to come. What the readings rule out is locked.`,
  };
}
