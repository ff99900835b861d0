/**
 * Lives through a day at the bench with the product's own services and instants of the past: acts of people in the order
 * of time, and between them what the server would have done by itself. Nothing is made up but who did what when.
 */
import type { EntityManager } from 'typeorm';
import type { ChargeDto } from '@/shared/contract/charge';
import type { Deps } from '../deps';
import { loadFile, type ChargeFile } from '../services/charge-file';
import { promisedAt, TOLD_AGAIN_MS } from '../services/charge-due';
import { nextLookIn } from '../services/charge-look-ins';
import { isRunning } from '../services/charge-stages';
import { bringDueCharges } from '../services/due-charges.service';
import { demoWorkshopId } from './demo-workshop';

const SOON_MS = 10_000;

export interface Act {
  /** Epoch ms. */
  at: number;
  /** Name of the charge it belongs to. */
  charge: string;
  run: (at: number) => Promise<void>;
}

/** What somebody does whenever a charge has come so far; asked after every act and tick. */
export type Reaction = (file: ChargeFile, at: number) => Act | null;

export interface BenchDay {
  deps: Deps;
  /** Id and revision of each charge by its name, once it is planned. */
  charges: Map<string, { id: string; rev: number }>;
  /** Remembers a charge as it was answered. */
  remember(charge: string, dto: ChargeDto): void;
  plan(acts: readonly Act[], reaction?: { charge: string; react: Reaction }): void;
  /** Lives through all acts up to `now`. */
  live(now: number): Promise<void>;
}

/** Acts that are ticks of the server; a newer one takes the place of an older one of the same charge. */
const ticks = new WeakSet<Act['run']>();

export function makeBenchDay(deps: Deps): BenchDay {
  const charges: BenchDay['charges'] = new Map();
  const reactions = new Map<string, Reaction>();
  const answers = new WeakSet<Act>();
  const ahead: Act[] = [];
  const add = (act: Act): void => {
    const place = ahead.findIndex((other) => other.at > act.at);
    ahead.splice(place < 0 ? ahead.length : place, 0, act);
  };
  const tickOf = (at: number, charge: string): Act => {
    const run: Act['run'] = (then) => tick(deps, charges, charge, then);
    ticks.add(run);
    return { at, charge, run };
  };
  const revisit = async (charge: string, at: number): Promise<void> => {
    const known = charges.get(charge);
    if (!known) return;
    const file = await loadFile(deps.dataSource.manager, demoWorkshopId, known.id);
    known.rev = file.charge.rev;
    const next = nextCause(file, at);
    // One tick ahead of each charge is enough: after it the next is looked for.
    dropTicks(ahead, charge);
    if (next !== null) add(tickOf(next, charge));
    const pending = ahead.some((act) => act.charge === charge && answers.has(act));
    const answer = pending ? null : (reactions.get(charge)?.(file, at) ?? null);
    if (answer === null) return;
    answers.add(answer);
    add(answer);
  };
  return {
    deps,
    charges,
    remember: (charge, dto) => void charges.set(charge, { id: dto.id, rev: dto.rev }),
    plan(acts, reaction) {
      for (const act of acts) add(act);
      if (reaction) reactions.set(reaction.charge, reaction.react);
    },
    async live(now) {
      for (let act = ahead[0]; act && act.at <= now; act = ahead[0]) {
        ahead.shift();
        await act.run(act.at);
        await revisit(act.charge, act.at);
      }
      for (const name of charges.keys()) await tick(deps, charges, name, now);
    },
  };
}

function dropTicks(ahead: Act[], charge: string): void {
  for (let place = ahead.length - 1; place >= 0; place -= 1)
    if (ahead[place]!.charge === charge && ticks.has(ahead[place]!.run)) ahead.splice(place, 1);
}

/** What the server does by itself for this one charge. */
async function tick(deps: Deps, charges: BenchDay['charges'], charge: string, at: number): Promise<void> {
  const others = [...charges].filter(([name]) => name !== charge).map(([, { id }]) => id);
  const { failed } = await bringDueCharges(deps, at, new Set(others));
  if (failed.length > 0) throw new Error(`The demo's ${charge} could not be brought on.`);
}

/** Next instant at which something happens to a charge without anybody's doing; null: nothing. */
function nextCause(file: ChargeFile, at: number): number | null {
  const { charge } = file;
  if (charge.startedAt === null || charge.closedAt !== null || charge.stage === 'ready') return null;
  const due = charge.checkDueAt;
  const held = charge.stage === 'held';
  const late = !held && isRunning(charge.stage) && charge.currentEndAt !== null && charge.currentEndAt <= at;
  const instants = [
    promisedAt(file),
    // The end has come by the numbers and the stage has not: looked at again at once, as the server does.
    late ? at + SOON_MS : null,
    ...(held ? [] : [charge.taperAt, charge.currentEndAt, due, nextLookIn(file, at)?.dueAt ?? null]),
    ...(due === null || held ? [] : TOLD_AGAIN_MS.map((wait) => due + wait)),
  ];
  const later = instants.filter((instant) => instant !== null).filter((instant) => instant > at);
  return later.length === 0 ? null : Math.min(...later);
}

/** A charge as it stands in the database. */
export const fileOf = (manager: EntityManager, day: BenchDay, charge: string): Promise<ChargeFile> =>
  loadFile(manager, demoWorkshopId, day.charges.get(charge)!.id);
