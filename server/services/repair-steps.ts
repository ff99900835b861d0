import type { PersonRef } from '@/shared/contract/common';
import { aimOf } from '@/shared/contract/pack';
import type { RepairStepDto } from '@/shared/contract/repair';
import { repairSteps as stepOrder, type RepairStep } from '@/shared/contract/repair-steps';
import { personRef } from './alert-dto';
import { toInstant } from './instants';
import { packVerdict } from './pack-numbers';
import { repairBlock } from './repair-block';
import { repairFacts, type RepairFacts } from './repair-facts';
import type { RepairFile } from './repair-file';

interface Done {
  at: number;
  personId: string | null;
}
const done = (at: number, personId: string | null): Done => ({ at, personId });

/**
 * The seven steps of the strip, out of the rows alone: what is done, since when and by whom; the first that is not is the
 * present one, or the one that is blocked.
 */
export function repairSteps(file: RepairFile, facts: RepairFacts = repairFacts(file)): RepairStepDto[] {
  const found: Record<RepairStep, Done | null> = {
    read: facts.arrival === null ? null : done(facts.arrival.at, facts.arrival.personId),
    'second-source': sourceDone(facts),
    target: facts.target === null ? null : done(facts.target.at, facts.target.personId),
    spare: spareDone(file, facts),
    charge: chargeDone(facts),
    fit: fitDone(file, facts),
    prove: proveDone(file, facts),
  };
  const over = file.repair.handedOverAt !== null || file.repair.deletedAt !== null;
  const present = over ? undefined : stepOrder.find((step) => found[step] === null);
  const block = over ? null : repairBlock(file, facts);
  return stepOrder.map((step) => {
    const one = found[step];
    const by: PersonRef | null = one === null ? null : personRef(file.people, one.personId);
    const state = one !== null ? 'done' : step !== present ? 'to-come' : block !== null ? 'blocked' : 'present';
    return { step, state, at: one === null ? null : toInstant(one.at), by };
  });
}

function sourceDone({ source, settled }: RepairFacts): Done | null {
  if (source === null || settled === null) return null;
  return source.decidedAt === null ? done(source.at, source.personId) : done(source.decidedAt, source.decidedById);
}

function spareDone({ repair }: RepairFile, facts: RepairFacts): Done | null {
  if (facts.spareAt !== null) return done(facts.spareAt, repair.spareById);
  const charge = (facts.ready ?? facts.open)?.charge;
  return charge ? done(charge.createdAt, charge.createdById) : null;
}

/** A spare that needed no charge is past it once it is in. */
function chargeDone({ ready, asItIs }: RepairFacts): Done | null {
  if (ready === null) return asItIs === null ? null : done(asItIs.at, asItIs.personId);
  const { charge, restChecks } = ready;
  return done(charge.readyAt ?? charge.closedAt ?? charge.createdAt, restChecks.at(-1)?.personId ?? charge.personId);
}

function fitDone({ fitters }: RepairFile, { fitted, asItIs }: RepairFacts): Done | null {
  if (fitted === null) return asItIs === null ? null : done(asItIs.at, asItIs.personId);
  const { charge } = fitted;
  return done(charge.closedAt ?? charge.createdAt, fitters.get(charge.id) ?? charge.personId);
}

/** A reading since the fit at or under the aim; else what was accepted with the hand-over. */
function proveDone({ repair }: RepairFile, { proof }: RepairFacts): Done | null {
  if (proof !== null && packVerdict(proof.groupVolts, repair).spreadMillivolts <= aimOf(repair))
    return done(proof.at, proof.personId);
  return proof !== null && repair.handedOverAt !== null ? done(repair.handedOverAt, repair.handedOverById) : null;
}
