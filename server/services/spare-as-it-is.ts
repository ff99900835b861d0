/** Whether the spare reserved for a repair rests within the tolerance of its target already: it needs no charge then. */
import type { EntityManager } from 'typeorm';
import { soonestTerminals } from '@/calc/index';
import type { ModuleType } from '../entities/module-type';
import type { Spare } from '../entities/spare';
import type { SpareReading } from '../entities/spare-reading';
import type { StoredTarget } from '../entities/repair-json';
import { lastMoveOf } from '../repositories/spare-moves.repository';
import { findLastSpareReading } from '../repositories/spares.repository';
import { candidateGround, candidatePlan, candidateState, candidateTarget } from './candidate-plan';
import { repairFacts } from './repair-facts';
import type { RepairFile } from './repair-file';

/**
 * Older than this a reading says what the spare was, not what goes into the pack, ms. A guess: a day, in which a sound module
 * drifts by far less than a millivolt.
 */
const MOST_AGE = 24 * 3_600_000;

export interface AsItIs {
  spare: Spare;
  type: ModuleType;
  target: StoredTarget;
  reading: SpareReading;
  /** It has to be read once more before it goes in. */
  old: boolean;
}

/** Null: it needs a charge, or something else comes first. */
export async function spareAsItIs(manager: EntityManager, file: RepairFile, now: number): Promise<AsItIs | null> {
  const { repair, spare, type } = file;
  const facts = repairFacts(file);
  const { target } = facts;
  if (repair.handedOverAt !== null || repair.deletedAt !== null) return null;
  if (spare === null || type === null || target === null || facts.spareAt === null || facts.disagree) return null;
  if (spare.fittedAt !== null || facts.open !== null || facts.ready !== null || facts.asItIs !== null) return null;
  const reading = await findLastSpareReading(manager, repair.workshopId, spare.id);
  const move = reading === null ? null : await lastMoveOf(manager, repair.workshopId, spare.id);
  if (reading === null || (move !== null && move.until > reading.at)) return null;
  const ground = candidateGround(file, type, candidateTarget(file, type, now)!, [], now);
  const state = candidateState(spare, type, reading, file.meters, now);
  const { alreadyWithin, refusals } = soonestTerminals(candidatePlan(ground, state, reading));
  if (!alreadyWithin || refusals.length > 0) return null;
  return { spare, type, target, reading, old: now - reading.at > MOST_AGE };
}
