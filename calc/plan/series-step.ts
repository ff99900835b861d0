import { chargeThroughTerminals } from '../charge-through-terminals';
import { voltsAtSoc } from '../curve/ocv';
import type { ChannelParameters, Finish, StepKind, Way } from '../plan-types';
import type { CellGroup, Direction, StepResult } from '../types';
import { chargerDraft } from './charger-draft';
import type { DraftStep, NotPossible } from './draft';
import type { PlanModel } from './plan-model';
import type { Sample } from './samples';
import { settleSource, type SourceSettings } from './source-settings';
import { stringCharge, type StringCharge } from './string-charge';
import { ampsText, groupText, limitText, millivoltsText } from './words';

/** An end current below this cannot be read off any charger, A. */
const LEAST_END_AMPS = 1e-4;
/**
 * Under current a group may stand this far past its limit, V: at a set voltage of the limit itself unequal groups share it unevenly.
 * A tenth of the ±50 mV that guides allow a 4.20 V cell.
 */
const LIMIT_MARGIN_VOLTS = 0.005;

/** Current of a pre-charge, as a multiple of a group's capacity per hour: 10 to 20 % of the fast current (charger chips). */
export const PRECHARGE_RATE_C = 0.1;

export interface SeriesStepInput {
  model: PlanModel;
  kind: StepKind;
  way: Way;
  channel: ChannelParameters;
  finish: Finish;
  direction: Direction;
  /** 0-based groups of the module it moves. */
  groupIndexes: number[];
  /** Groups between the clips as the core sees them: those of `groupIndexes`, or the one they are joined to. */
  groups: CellGroup[];
  linkOhm: number;
  limitTimes: number;
  /** Summed rest voltage aimed at, V; with `first` the sum at that state. */
  aimVolts: number;
  /** Ends when the first group is at the target, and not by the sum. */
  first: boolean;
  /** What may stay short on the mark, V over the groups. */
  markVolts: number;
  /** Most amps of this step, A; left out: as channel and module allow. */
  mostAmps?: number;
  /** State of all groups before the step, nominal. */
  socBefore: number[];
  /** The string between the clips in one sample. */
  stringIn: (sample: Sample) => { string: StringCharge; ohm: number };
}

/** Runs one step between two clips and makes it ready for the band. */
export function seriesStep(input: SeriesStepInput): DraftStep | NotPossible {
  const { model, channel, finish, direction, groups, aimVolts } = input;
  const sign = direction === 'charge' ? 1 : -1;
  const settings = settleSource({
    model,
    channel,
    direction,
    finish,
    groups,
    linkOhm: input.linkOhm,
    limitTimes: input.limitTimes,
    aimVolts,
    ...prechargeLimit(input),
  });
  if ('reason' in settings) return settings;
  const { module } = model.input;
  const onTheMark = finish === 'on-the-mark';
  const byGroup = input.first && !onTheMark;
  const result = chargeThroughTerminals(
    {
      groups,
      curve: model.curve,
      linkResistanceOhm: input.linkOhm,
      coulombicEfficiency: model.efficiency,
      direction,
      source: settings.source,
      stop: {
        relaxedVolts: byGroup ? null : aimVolts,
        toleranceVolts: onTheMark ? input.markVolts : 0,
        groupRelaxedVolts: byGroup ? model.targetVolts : null,
        cutoffAmps: onTheMark && channel.minAmps > 0 ? channel.minAmps : null,
        groupVolts:
          direction === 'charge'
            ? module.chargeLimitVolts + LIMIT_MARGIN_VOLTS
            : module.dischargeLimitVolts - LIMIT_MARGIN_VOLTS,
      },
      settledVolts: model.settledVolts(groups.length),
    },
    { trace: true },
  );
  const failed = failure(input, settings, result);
  if (failed) return failed;
  return toDraftStep(input, settings, result, sign);
}

/** Amps of a step: what was asked; else C/10 throughout where a group is still below its pre-charge volts. */
function prechargeLimit({ mostAmps, direction, groups, model }: SeriesStepInput): { mostAmps?: number } {
  const most = mostAmps ?? prechargeAmps(model, direction, groups);
  return most === null ? {} : { mostAmps: most };
}

/** C/10 of the smallest group that is still below its pre-charge volts, A; null: none is. */
export function prechargeAmps(model: PlanModel, direction: Direction, groups: readonly CellGroup[]): number | null {
  const below = model.input.module.prechargeBelowVolts ?? null;
  if (below === null || direction !== 'charge') return null;
  const low = groups.filter((group) => group.restVolts < below - 1e-9);
  return low.length === 0 ? null : PRECHARGE_RATE_C * Math.min(...low.map((group) => group.capacityAh));
}

function failure(input: SeriesStepInput, settings: SourceSettings, result: StepResult): NotPossible | null {
  const { channel, model, aimVolts, groups, direction, groupIndexes } = input;
  if (result.outcome === 'target') return null;
  if (result.outcome === 'group-limit') {
    const group = groupIndexes[result.limitingGroup ?? 0]!;
    const limit = direction === 'charge' ? model.input.module.chargeLimitVolts : model.input.module.dischargeLimitVolts;
    return {
      reason: `At ${ampsText(settings.source.maxAmps ?? result.endAmps)} ${groupText(group)} would be at its ${limitText(limit)} before the target. Take fewer amps.`,
    };
  }
  if (result.outcome === 'cutoff') {
    const short = Math.abs(aimVolts - result.relaxedVolts) / groups.length;
    if (short <= model.toleranceVolts) return null;
    return {
      reason: `${channel.name} holds no less than ${ampsText(channel.minAmps)} and would end ${millivoltsText(short)} short.`,
    };
  }
  return {
    reason: `Unreachable with ${channel.name}: ${lowerFirst(result.reason ?? 'the current dies away before the target.')}`,
  };
}

const lowerFirst = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1);

function toDraftStep(input: SeriesStepInput, settings: SourceSettings, result: StepResult, sign: 1 | -1): DraftStep {
  const { model, groups, groupIndexes, finish, direction } = input;
  const joined = groups.length === 1 && groupIndexes.length > 1;
  const socAfter = [...input.socBefore];
  groupIndexes.forEach((group, at) => (socAfter[group] = result.groups[joined ? 0 : at]!.soc));
  const { source, setVolts } = settings;
  const { channel, aimVolts } = input;
  const ohm = source.leadResistanceOhm + input.linkOhm + input.stringIn(model.nominal).ohm;
  const markVolts = Math.max(input.markVolts, channel.minAmps * ohm);
  return chargerDraft(
    model,
    result,
    {
      kind: input.kind,
      way: input.way,
      channel,
      groupIndexes,
      direction,
      setVolts,
      setAmps: settings.setAmps,
      socAfter,
      polarisationAfter: groupIndexes.map((_, at) => result.groups[joined ? 0 : at]!.polarisationVolts),
      capVolts: settings.capVolts,
    },
    {
      source,
      sign,
      count: groups.length,
      linkOhm: input.linkOhm,
      aimVolts,
      first: input.first,
      endAmps:
        finish === 'on-the-mark' && setVolts !== null
          ? Math.max((sign * (setVolts - aimVolts) + markVolts) / ohm, LEAST_END_AMPS)
          : null,
      stringIn: input.stringIn,
    },
  );
}

/** The module's own groups as a string in one sample, after what earlier steps have moved. */
export function sampleString(
  model: PlanModel,
  groupIndexes: number[],
  direction: Direction,
  movedAmpHours: (sample: Sample, group: number) => number,
): SeriesStepInput['stringIn'] {
  return (sample) => {
    const perAmpHour: number[] = [];
    const soc: number[] = [];
    let ohm = 0;
    for (const group of groupIndexes) {
      const capacity = sample.capacityAh[group]!;
      const moved = movedAmpHours(sample, group);
      perAmpHour.push(direction === 'charge' ? model.efficiency / capacity : -1 / capacity);
      soc.push(sample.startSoc[group]! + (moved > 0 ? moved * model.efficiency : moved) / capacity);
      ohm += sample.longOhm[group]!;
    }
    return { string: stringCharge(model.curve, soc, perAmpHour), ohm };
  };
}

/** The nominal groups as the core takes them, at a state and with what over-voltage is left. */
export function groupsAt(
  model: PlanModel,
  groupIndexes: number[],
  soc: readonly number[],
  polarisation?: readonly number[],
): CellGroup[] {
  return groupIndexes.map((group) => ({
    ...model.groups[group]!,
    restVolts: voltsAtSoc(model.curve, soc[group]!),
    polarisationVolts: polarisation?.[group] ?? 0,
  }));
}
