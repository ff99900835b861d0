import * as z from 'zod/mini';
import type { OcvTable } from '@/calc/types';
import { optionalInstant, optionalText, text, type Instant, type PersonRef } from './common';
import { optionalQuantity, quantity } from './quantity';

export const chemistryIds = ['nmc', 'lmo-blend', 'lfp', 'lto', 'nimh'] as const;
export const chemistryNames: Record<(typeof chemistryIds)[number], string> = {
  nmc: 'Graphite and NMC',
  'lmo-blend': 'Graphite and LMO blend',
  lfp: 'Graphite and LFP',
  lto: 'LTO',
  nimh: 'NiMH',
};
export const resistanceKinds = ['pulse-0.5s', 'pulse-10s', 'ac-1khz', 'long'] as const;

export const moduleTypeSchema = z
  .object({
    name: text('The name', 60),
    chemistry: z.enum(chemistryIds),
    groupsInSeries: quantity({ name: 'Groups in series', unit: '', min: 1, max: 24, whole: true }),
    cellsInParallel: quantity({ name: 'Cells a group', unit: '', min: 1, max: 100, whole: true }),
    ratedAh: quantity({ name: 'Rated capacity', unit: 'Ah', min: 0, aboveMin: true, max: 1000 }),
    chargeLimitVolts: quantity({ name: 'Charge limit', unit: 'V', min: 1, max: 5 }),
    dischargeLimitVolts: quantity({ name: 'Not below', unit: 'V', min: 0.5, max: 4 }),
    floorVolts: quantity({ name: 'Floor', unit: 'V', min: 0.1, max: 4 }),
    maxChargeAmps: quantity({ name: 'Current', unit: 'A', min: 0, aboveMin: true, max: 2000 }),
    maxDischargeAmps: quantity({ name: 'Discharge current', unit: 'A', min: 0, aboveMin: true, max: 2000 }),
    minChargeCelsius: quantity({ name: 'Charge from', unit: '°C', min: -40, max: 60 }),
    maxChargeCelsius: quantity({ name: 'Charge up to', unit: '°C', min: -20, max: 80 }),
    resistanceMilliohm: optionalQuantity({ name: 'Resistance', unit: 'mΩ', min: 0, aboveMin: true, max: 1000 }),
    resistanceKind: z.enum(resistanceKinds),
    linkMilliohm: quantity({ name: 'Links', unit: 'mΩ', min: 0, max: 100 }),
    shelfVolts: optionalQuantity({ name: 'Shelf voltage', unit: 'V', min: 0.5, max: 5 }),
    selfDischargePercentPerMonth: optionalQuantity({ name: 'Self-discharge', unit: '%', min: 0, max: 60 }),
    note: optionalText('The note'),
    // What follows may be left out: it stays as it is then, and a new type has none.
    /** Published curve of its chemistry; null: the usual one. */
    curveId: z.optional(z.nullable(z.string().check(z.maxLength(60)))),
    /** Two pulses of current tell how fast the over-voltage builds up: all four, or none. */
    pulseShortS: z.optional(optionalQuantity({ name: 'The short pulse', unit: 's', min: 0, aboveMin: true, max: 600 })),
    pulseShortMilliohm: z.optional(
      optionalQuantity({ name: 'Resistance', unit: 'mΩ', min: 0, aboveMin: true, max: 1000 }),
    ),
    pulseLongerS: z.optional(
      optionalQuantity({ name: 'The longer pulse', unit: 's', min: 0, aboveMin: true, max: 7200 }),
    ),
    pulseLongerMilliohm: z.optional(
      optionalQuantity({ name: 'Resistance', unit: 'mΩ', min: 0, aboveMin: true, max: 1000 }),
    ),
    /** Share of its charge current under 10 °C and over 45 °C; empty: all of it. */
    coldCurrentPercent: z.optional(optionalQuantity({ name: 'Current when cold', unit: '%', min: 1, max: 100 })),
    warmCurrentPercent: z.optional(optionalQuantity({ name: 'Current when warm', unit: '%', min: 1, max: 100 })),
    /** A group that rests below is first brought up to it at a tenth of its capacity an hour; empty: no such step. */
    prechargeBelowVolts: z.optional(optionalQuantity({ name: 'Precharge below', unit: 'V', min: 0.1, max: 4 })),
  })
  .check(
    z.refine((type) => [0, 4].includes(pulseNumbers(type)), {
      message: 'Type both pulses with seconds and mΩ, or leave all four empty.',
      path: ['pulseShortS'],
    }),
    z.refine((type) => pulseNumbers(type) !== 4 || type.pulseLongerS! > type.pulseShortS!, {
      message: 'Must be later than the short pulse.',
      path: ['pulseLongerS'],
    }),
    z.refine((type) => pulseNumbers(type) !== 4 || type.pulseLongerMilliohm! > type.pulseShortMilliohm!, {
      message: 'Must be more than the short pulse sees.',
      path: ['pulseLongerMilliohm'],
    }),
    z.refine(
      (type) =>
        (type.prechargeBelowVolts ?? null) === null ||
        (type.prechargeBelowVolts! > type.floorVolts && type.prechargeBelowVolts! < type.chargeLimitVolts),
      { message: 'Must lie between the floor and the charge limit.', path: ['prechargeBelowVolts'] },
    ),
    z.refine((type) => type.dischargeLimitVolts < type.chargeLimitVolts, {
      message: 'Must be under the charge limit.',
      path: ['dischargeLimitVolts'],
    }),
    z.refine((type) => type.floorVolts <= type.dischargeLimitVolts, {
      message: 'The floor is not above the discharge limit.',
      path: ['floorVolts'],
    }),
    z.refine((type) => type.minChargeCelsius < type.maxChargeCelsius, {
      message: 'Must be above the lower end.',
      path: ['maxChargeCelsius'],
    }),
    z.refine(
      (type) =>
        type.shelfVolts === null ||
        (type.shelfVolts >= type.dischargeLimitVolts && type.shelfVolts <= type.chargeLimitVolts),
      { message: 'Outside the limits of this type.', path: ['shelfVolts'] },
    ),
  );
interface PulseNumbers {
  pulseShortS?: number | null;
  pulseShortMilliohm?: number | null;
  pulseLongerS?: number | null;
  pulseLongerMilliohm?: number | null;
}
/** How many of the four are there. */
function pulseNumbers(type: PulseNumbers): number {
  const all = [type.pulseShortS, type.pulseShortMilliohm, type.pulseLongerS, type.pulseLongerMilliohm];
  return all.filter((one) => (one ?? null) !== null).length;
}

/** A curve as CSV: state of charge and rest volts of one cell, a row each. */
export const ownCurveSchema = z.object({
  csv: z
    .string()
    .check(
      z.trim(),
      z.minLength(1, 'There is nothing in it. Paste or choose a table.'),
      z.maxLength(100_000, 'This is too long for a curve. Leave out rows: one for each half per cent is plenty.'),
    ),
});
export type OwnCurveInput = z.infer<typeof ownCurveSchema>;

export type ModuleTypeInput = z.infer<typeof moduleTypeSchema>;

export interface ModuleTypeDto extends Required<ModuleTypeInput> {
  id: string;
  /** The workshop's own curve, which goes before the published ones; null: none. */
  ownCurve: OcvTable | null;
  spareCount: number;
  chargeCount: number;
  rev: number;
}

export const channelSchema = z
  .object({
    /** Left out for a new channel of the charger. */
    id: z.optional(z.string()),
    name: text('The channel’s name', 20),
    maxAmps: quantity({ name: 'Current', unit: 'A', min: 0, aboveMin: true, max: 2000 }),
    minAmps: quantity({ name: 'Least current', unit: 'A', min: 0, max: 2000 }),
    maxVolts: quantity({ name: 'Voltage', unit: 'V', min: 0, aboveMin: true, max: 1000 }),
    maxWatts: optionalQuantity({ name: 'Power', unit: 'W', min: 0, aboveMin: true, max: 100000 }),
    adjustableVolts: z.boolean(),
    senses: z.enum(['own-terminals', 'module']),
    leadMilliohm: quantity({ name: 'Leads', unit: 'mΩ', min: 0, max: 1000 }),
    displayStepMillivolts: quantity({ name: 'Display step', unit: 'mV', min: 0.1, max: 1000 }),
    // What follows may be left out: it stays as it is then, and a new channel has none.
    /** What its current is set and shown in. */
    displayStepAmps: z.optional(optionalQuantity({ name: 'Current step', unit: 'A', min: 0, aboveMin: true, max: 10 })),
    /** False: the leads are a guess. */
    leadsMeasured: z.optional(z.nullable(z.boolean())),
    /** In a room warmer than this it gives only that share of its current: both, or none. */
    deratingAboveCelsius: z.optional(optionalQuantity({ name: 'Less current above', unit: '°C', min: 0, max: 80 })),
    deratingPercent: z.optional(optionalQuantity({ name: 'Current when warm', unit: '%', min: 1, max: 99 })),
    /** Share of the time in which it gives current, between thermal pauses; empty: all of it. */
    dutyPercent: z.optional(optionalQuantity({ name: 'Share of the time', unit: '%', min: 1, max: 100 })),
    singleGroup: z.boolean(),
    canDischarge: z.boolean(),
    dischargeAmps: optionalQuantity({ name: 'Discharge current', unit: 'A', min: 0, aboveMin: true, max: 2000 }),
    loadOhm: optionalQuantity({ name: 'Load resistor', unit: 'Ω', min: 0, aboveMin: true, max: 10000 }),
  })
  .check(
    z.refine((channel) => channel.minAmps < channel.maxAmps, {
      message: 'Must be under the current.',
      path: ['minAmps'],
    }),
    z.refine(
      (channel) => ((channel.deratingAboveCelsius ?? null) === null) === ((channel.deratingPercent ?? null) === null),
      { message: 'Type the temperature and the share, or leave both empty.', path: ['deratingPercent'] },
    ),
    z.refine((channel) => !channel.canDischarge || channel.dischargeAmps !== null || channel.loadOhm !== null, {
      message: 'A channel that discharges needs its current or its load resistor.',
      path: ['dischargeAmps'],
    }),
  );
export type ChannelInput = z.infer<typeof channelSchema>;

export const chargerSchema = z.object({
  name: text('The charger’s name', 60),
  place: optionalText('The place', 60),
  meterId: z.nullable(z.string()),
  channels: z
    .array(channelSchema)
    .check(z.minLength(1, 'A charger has at least one channel.'), z.maxLength(32, 'At most 32 channels.')),
});
export type ChargerInput = z.infer<typeof chargerSchema>;

/** Somebody has called a channel out of order. */
export interface ChannelFaultDto {
  at: Instant;
  seen: string;
  by: PersonRef | null;
}
export const channelFaultSchema = z.object({ seen: text('What was seen', 200) });
export type ChannelFaultInput = z.infer<typeof channelFaultSchema>;

export interface ChannelDto extends Required<Omit<ChannelInput, 'id'>> {
  id: string;
  chargerId: string;
  chargerName: string;
  /** Null: nobody has said that it is out of order. */
  fault: ChannelFaultDto | null;
  /** Charge that holds it now, and from when it is free. */
  heldBy: { chargeId: string; title: string; stage: string; freeAt: Instant | null } | null;
}

export interface ChargerDto {
  id: string;
  name: string;
  place: string | null;
  meterId: string | null;
  channels: ChannelDto[];
  retired: boolean;
  rev: number;
}

export const resistorSchema = z.object({
  name: text('The name', 60),
  ohm: quantity({ name: 'Resistance', unit: 'Ω', min: 0, aboveMin: true, max: 1000 }),
  maxWatts: quantity({ name: 'Power', unit: 'W', min: 0, aboveMin: true, max: 10000 }),
});
export type ResistorInput = z.infer<typeof resistorSchema>;
export interface ResistorDto extends ResistorInput {
  id: string;
  rev: number;
}

export const meterSchema = z.object({
  name: text('The name', 60),
  offsetMillivolts: quantity({ name: 'Offset', unit: 'mV', min: -100, max: 100 }),
  checkedAt: optionalInstant,
});
export type MeterInput = z.infer<typeof meterSchema>;
export interface MeterDto extends MeterInput {
  id: string;
  rev: number;
}
