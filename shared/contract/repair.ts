/** A repair: a pack with a failing module, from its booking to its hand-over. */
import * as z from 'zod/mini';
import { id, instant, optionalInstant, optionalText, reason, text, type Instant, type PersonRef } from './common';
import type { ChargeCardDto } from './charge';
import { packSchema, type PackDto } from './pack';
import type { ComputedTargetDto, PackReadingDto, SecondSourceDto, TargetDto } from './pack-reading';
import type { ModuleConditionDto, PhotoDto } from './photo';
import type { Band } from './plan';
import type { RepairStep } from './repair-steps';

const repairShape = {
  /** In the workshop's own words: 'Grey van'. */
  vehicle: text('The vehicle', 80),
  packTypeId: z.nullable(id),
  pack: packSchema,
  customerName: optionalText('The customer', 80),
  customerContact: optionalText('The contact', 120),
  promisedAt: optionalInstant,
  bay: optionalText('The bay', 40),
  /** Who works on it; the first is asked first. */
  personIds: z.array(id).check(z.maxLength(8, 'At most eight people.')),
  note: optionalText('The note', 2000),
};
export const repairSchema = z.object({
  /** 'R-2431'; left out: the next one. */
  number: z.optional(optionalText('The number', 20)),
  ...repairShape,
});
export type RepairInput = z.infer<typeof repairSchema>;
export const changeRepairSchema = z.object(repairShape);
export type ChangeRepairInput = z.infer<typeof changeRepairSchema>;

export const reserveSpareSchema = z.object({ spareId: id });

/** The reserved spare goes in without a charge. */
export const fitAsItIsSchema = z.object({ note: optionalText('The note', 300) });
export type FitAsItIsInput = z.infer<typeof fitAsItIsSchema>;

export const moduleFates = ['scrap', 'quarantine', 'stock', 'went-back-in'] as const;
export type ModuleFate = (typeof moduleFates)[number];
export const moduleFateNames: Record<ModuleFate, string> = {
  scrap: 'Scrapped',
  quarantine: 'In quarantine',
  stock: 'In stock after tests',
  'went-back-in': 'Went back in at the customer’s wish',
};
/** What became of the module taken out. 'went-back-in' is one that was advised against and declined: it needs a reason. */
export const removedModuleSchema = z
  .object({
    modulePosition: text('The module position', 20),
    fate: z.enum(moduleFates),
    note: optionalText('The note', 300),
  })
  .check(
    z.refine((one) => one.fate !== 'went-back-in' || one.note !== null, {
      message: 'Say what was advised and why it was declined.',
      path: ['note'],
    }),
  );
export type RemovedModuleInput = z.infer<typeof removedModuleSchema>;

export const advisedOutcomes = ['open', 'done', 'booked', 'declined'] as const;
export type AdvisedOutcome = (typeof advisedOutcomes)[number];
export const advisedOutcomeNames: Record<AdvisedOutcome, string> = {
  open: 'Not answered yet',
  done: 'Done',
  booked: 'Booked',
  declined: 'Declined by the owner',
};
/** What was advised, and what became of it. What is declined carries the customer's name, typed as agreement. */
export const advisedSchema = z
  .object({
    text: text('What is advised', 80),
    outcome: z.enum(advisedOutcomes),
    /** '8 September' */
    detail: optionalText('The detail', 80),
    agreedBy: optionalText('The customer’s name', 80),
  })
  .check(
    z.refine((one) => one.outcome !== 'declined' || one.agreedBy !== null, {
      message: 'Type the name of the customer who declined it.',
      path: ['agreedBy'],
    }),
  );
export type AdvisedInput = z.infer<typeof advisedSchema>;

export const handOverRepairSchema = z.object({ note: optionalText('The note', 500) });
export const archiveRepairSchema = z.object({ archived: z.boolean() });
export const deleteRepairSchema = z.object({ reason });

/** Corrects a recorded wait. */
export const correctWaitSchema = z.object({ from: instant, to: z.nullable(instant), reason }).check(
  z.refine((one) => one.to === null || Date.parse(one.from) <= Date.parse(one.to), {
    message: 'It ends before it begins.',
    path: ['to'],
  }),
);
export type CorrectWaitInput = z.infer<typeof correctWaitSchema>;

export type StepState = 'done' | 'present' | 'to-come' | 'blocked';
export interface RepairStepDto {
  step: RepairStep;
  state: StepState;
  /** Since when it is done, and by whom; null: it is not. */
  at: Instant | null;
  by: PersonRef | null;
}

export type RepairState = 'open' | 'handed-over' | 'archived' | 'deleted';

/** What keeps a repair from going on. */
export interface RepairBlock {
  code: 'sources-disagree' | 'module-condition' | 'module-unknown' | 'check-outside' | 'charge-odd';
  /** 'The pack says module 17, your meter says 18.' */
  text: string;
  /** Who may decide; null: anybody. */
  role: 'foreman' | 'manager' | null;
}

/** A repair as lists show it. */
export interface RepairCardDto {
  id: string;
  number: string;
  vehicle: string;
  bay: string | null;
  people: PersonRef[];
  promisedAt: Instant | null;
  state: RepairState;
  /** Null: handed over. */
  step: RepairStep | null;
  block: RepairBlock | null;
  failing: string | null;
  /** The charge that is open for it. */
  charge: ChargeCardDto | null;
  /** Of the latest reading that counts. */
  spreadMillivolts: number | null;
  needsSomebody: boolean;
  waits: boolean;
  rev: number;
  bookedAt: Instant;
}

export interface RepairWaitDto {
  id: string;
  from: Instant;
  /** Null: it waits still. */
  to: Instant | null;
  modulePosition: string | null;
  corrected: { reason: string; at: Instant; by: PersonRef } | null;
}

export interface RemovedModuleDto extends RemovedModuleInput {
  id: string;
  at: Instant;
  by: PersonRef;
}

/** A spare that was fitted without a charge. */
export interface FittedSpareDto {
  id: string;
  spare: { id: string; label: string };
  modulePosition: string | null;
  /** By which it was within the tolerance. */
  groupVolts: number[];
  note: string | null;
  at: Instant;
  by: PersonRef;
}

export interface AdvisedDto extends AdvisedInput {
  id: string;
  at: Instant;
  by: PersonRef;
  /** When the name was typed. */
  agreedAt: Instant | null;
}

export interface RepairEventDto {
  id: string;
  at: Instant;
  by: PersonRef | null;
  text: string;
}

/** How many balance charges are still to come until the spread is at the aim. */
export interface BalanceForecastDto {
  aimMillivolts: number;
  /** Null: it does not converge, or too little is known. */
  charges: Band | null;
  /** What one of them has on the charger, h. */
  hoursPerCharge: number;
  /** Spread after each of the next ones, mV; empty where nothing is forecast. */
  expectedMillivolts: Band[];
  from: 'bleed' | 'log' | 'both' | null;
  doesNotConverge: 'capacity-spread' | 'no-change' | 'grows' | null;
}

export interface RepairDto extends RepairCardDto, Omit<RepairInput, 'number' | 'pack' | 'promisedAt' | 'bay'> {
  pack: PackDto;
  packTypeName: string | null;
  steps: RepairStepDto[];
  /** Newest first, with those set aside. */
  readings: PackReadingDto[];
  sources: SecondSourceDto[];
  /** As the latest arrival reading has it; null: nothing is read, or nothing healthy is known. */
  computed: ComputedTargetDto | null;
  target: TargetDto | null;
  spare: { id: string; label: string; shelfPlace: string | null } | null;
  charges: ChargeCardDto[];
  /** Newest first. */
  fittedAsItIs: FittedSpareDto[];
  removed: RemovedModuleDto[];
  /** In the order in which it was advised. */
  advised: AdvisedDto[];
  wait: RepairWaitDto[];
  /** Newest first. */
  photos: PhotoDto[];
  /** What the photos show of its modules; the worst first. */
  conditions: ModuleConditionDto[];
  /** Spread expected after the fit, mV, by the spare's reading or its check. */
  expectedAfterFit: { low: number; likely: number; high: number } | null;
  forecast: BalanceForecastDto | null;
  bookedBy: PersonRef;
  handedOver: { at: Instant; by: PersonRef; note: string | null } | null;
  deleted: { at: Instant; by: PersonRef; reason: string } | null;
  /** The customer's name and contact were erased. */
  erased: { at: Instant; by: PersonRef; reason: string } | null;
}

export interface RepairPageDto extends RepairDto {
  /** The reserved spare rests within the tolerance: it needs no charge. Old: it has to be read once more. Null: it is not so. */
  asItIs: { readAt: Instant; old: boolean } | null;
  events: RepairEventDto[];
}

export const repairsQuerySchema = z.object({
  q: z.optional(z.string().check(z.maxLength(60, 'This is too long to look for.'))),
  state: z.optional(z.enum(['open', 'handed-over', 'archived', 'deleted'])),
  page: z.optional(z.string().check(z.regex(/^[1-9]\d{0,5}$/, 'Pages are counted from 1.'))),
});
export type RepairsQuery = z.infer<typeof repairsQuerySchema>;

export interface RepairListDto {
  repairs: RepairCardDto[];
  counts: { open: number; needsSomebody: number; waiting: number; handedOver: number };
  /** Null: this is the last page. */
  nextPage: number | null;
}

/** A spare of the type for the target of a repair. */
export interface CandidateDto {
  spareId: string;
  label: string;
  shelfPlace: string | null;
  groupVolts: number[] | null;
  readAt: Instant | null;
  usedCapacityAh: number;
  capacitySource: 'measured' | 'label' | 'guessed';
  /** Whole time to the target on the best free channel, rest and check included, s; null: it cannot. */
  seconds: Band | null;
  channelName: string | null;
  /** False: it rests within the tolerance already and can be fitted as it is. */
  needsCharge: boolean;
  /** Sentences: what is wrong with it, or why it cannot. */
  problems: string[];
  /** Cannot be planned for this target. */
  ruledOut: boolean;
  reservedFor: { repairId: string; number: string } | null;
  /** Voltage difference to its neighbours to be expected when the pack is full and nearly empty, mV; null: nothing is known. */
  agreement: { fullMillivolts: number; lowMillivolts: number; bestMatchPercent: number } | null;
}
