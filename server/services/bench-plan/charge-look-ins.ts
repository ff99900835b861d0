/** The look-ins of all charges: who came, and who is to come. */
import { assignLookIns } from '@/calc/index';
import type { NobodyDto, PlanLookInDto } from '@/shared/contract/bench-plan';
import type { ChargeFile } from '../charge-file';
import { lookInTimes } from '../charge-look-ins';
import { waitShiftMs } from '../charge-segments';
import { channelNamesOf } from '../charge-steps';
import { listText, titleOf } from '../charge-words';
import { toInstant, toOptionalInstant } from '../instants';
import { isRunning } from '../charge-stages';
import { hasTime, ownerOf, type BenchGround } from './ground';
import { binds, endsOf, type HandBlock } from './hands';
import { nobodyWords } from './nobody-words';
import type { Stretch } from './spans';

export interface GivenLookIn {
  file: ChargeFile;
  dueAt: number;
  doneAt: number | null;
  personId: string | null;
  /** Why nobody can; null: somebody can, or it has been done. */
  nobody: NobodyDto | null;
}

/** What a look-in takes where the workshop has not said, min. A guess of the trade. */
const VISIT_MINUTES = 5;
export const lookInMs = ({ workshop }: Pick<BenchGround, 'workshop'>): number =>
  (workshop.lookInVisitMinutes ?? VISIT_MINUTES) * 60_000;

/**
 * Look-ins of the charges, done and to come. Each of those to come goes to the charge's own person where they are there
 * and have their hands free, else to somebody who is; to nobody, with the reason, where nobody can.
 * @param handsOf the laid out hands of each person, by id
 */
export function givenLookIns(ground: BenchGround, hands: ReadonlyMap<string, readonly HandBlock[]>): GivenLookIn[] {
  const { now, files, people } = ground;
  const done = files.flatMap((file) =>
    file.lookIns
      .filter(({ doneAt }) => doneAt !== null)
      .map(({ dueAt, doneAt, personId }): GivenLookIn => ({ file, dueAt, doneAt, personId, nobody: null })),
  );
  const wanted = files
    .filter((file) => hasTime(file, now))
    .flatMap((file) => wantedOf(file, now).map((dueAt) => ({ file, dueAt })));
  const seconds = ({ from, to }: Stretch) => ({ fromS: (from - now) / 1000, toS: (to - now) / 1000 });
  const given = assignLookIns(
    wanted.map(({ file, dueAt }, index) => ({
      id: String(index),
      atS: (Math.max(now, dueAt) - now) / 1000,
      ownerId: ownerOf(ground, file),
    })),
    people.map(({ id, present }) => ({
      id,
      present: present.map(seconds),
      busy: (hands.get(id) ?? []).filter(binds).map(seconds),
    })),
    lookInMs(ground) / 1000,
  );
  const coming = wanted.map((one, index): GivenLookIn => {
    const { personId, nobody: kind } = given[index]!;
    const from = Math.max(now, one.dueAt);
    const visit = { from, to: from + lookInMs(ground) };
    const nobody = kind === null ? null : { kind, because: nobodyWords(ground, hands, kind, visit) };
    return { ...one, doneAt: null, personId, nobody };
  });
  return [...done, ...coming].sort((a, b) => a.dueAt - b.dueAt);
}

/** Instants at which somebody is still to look in: those that the charge asks for, and those it will once it runs. */
function wantedOf(file: ChargeFile, now: number): number[] {
  const { charge } = file;
  const { lookInIntervalS } = charge.frozen.workshop;
  if (charge.stage === 'planned' || charge.stage === 'queued') {
    const begins = Math.max(
      now,
      charge.clipOnAt + Math.round(charge.option.currentStartS * 1000) + waitShiftMs(file, now),
    );
    return lookInTimes(begins, endsOf(file, now).checkAt, lookInIntervalS);
  }
  if (!isRunning(charge.stage) && charge.stage !== 'resting') return [];
  const last = Math.max(-Infinity, ...file.lookIns.filter(({ doneAt }) => doneAt !== null).map(({ dueAt }) => dueAt));
  const open = file.lookIns.filter(({ doneAt, dueAt }) => doneAt === null && dueAt > last).map(({ dueAt }) => dueAt);
  // Of several that nobody came for the last is the one that is still to be made.
  const missed = open.filter((at) => at <= now).at(-1);
  return [...(missed === undefined ? [] : [missed]), ...open.filter((at) => at > now)];
}

export const lookInDto = ({ people }: BenchGround, given: GivenLookIn): PlanLookInDto => {
  const { file, dueAt, doneAt, personId, nobody } = given;
  const { charge } = file;
  const name =
    personId === null ? null : (people.find(({ id }) => id === personId)?.name ?? file.people.get(personId)?.name);
  return {
    chargeId: charge.id,
    title: titleOf(charge),
    channelName: listText(channelNamesOf(file, charge.reckoning?.reckoning.stepIndex ?? 0)),
    dueAt: toInstant(dueAt),
    doneAt: toOptionalInstant(doneAt),
    person: personId === null ? null : { id: personId, name: name ?? 'somebody' },
    nobody,
  };
};
