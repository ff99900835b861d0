import * as z from 'zod/mini';
import { optionalInstant, optionalText, text, type Instant } from './common';
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
  })
  .check(
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
export type ModuleTypeInput = z.infer<typeof moduleTypeSchema>;

export interface ModuleTypeDto extends ModuleTypeInput {
  id: string;
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

export interface ChannelDto extends Omit<ChannelInput, 'id'> {
  id: string;
  chargerId: string;
  chargerName: string;
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
