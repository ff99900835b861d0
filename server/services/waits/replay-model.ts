/** How long a recorded charge would take on another kind of channel, or under other rules. Pure; runs in the thread. */
import { runMinutes, socAtVolts } from '@/calc/index';
import type { Way } from '@/calc/plan-types';
import type { HistoryCharge, ReplayChange, ReplayHistory, ReplayKind, ReplayType } from './replay-history';

/** What a channel has before it: the whole string, one group, or all groups joined. */
type Load = 'string' | 'group' | 'joined';
type Minutes = (fromSoc: number, toSoc: number) => number | null;

export interface ReplayModel {
  /** Minutes on the channel; null: that kind cannot. */
  minutes: (charge: HistoryCharge, kind: number, changes: readonly ReplayChange[]) => number | null;
  /** Minutes of current between two rest volts of a group of this type, through the terminals; null: that kind cannot. */
  between: (type: number, kind: number, fromVolts: number, toVolts: number) => number | null;
}

export function replayModel({ kinds, types, hands }: Pick<ReplayHistory, 'kinds' | 'types' | 'hands'>): ReplayModel {
  const tables = new Map<string, Minutes | null>();
  const tableOf = (type: number, kind: number, load: Load, amps: number | undefined): Minutes | null => {
    const key = `${type}/${kind}/${load}/${amps ?? ''}`;
    const known = tables.get(key);
    if (known !== undefined) return known;
    const made = tableFor(types[type]!, kinds[kind]!, load, amps);
    tables.set(key, made);
    return made;
  };
  const wayMinutes = (way: Way, charge: HistoryCharge, kind: number, fromVolts: number, amps?: number) => {
    const type = types[charge.type]!;
    const load = loadOf[way];
    const table = tableOf(charge.type, kind, load, amps);
    if (!table) return null;
    const current = table(socOf(type, fromVolts), socOf(type, charge.toVolts));
    if (current === null) return null;
    const times = load === 'group' ? type.groups : 1;
    const handsS = times * hands.clipOnS + (times - 1) * hands.clipOffS + (load === 'joined' ? hands.busbarsS : 0);
    return (times * current * charge.groupAh) / type.ratedAh + handsS / 60;
  };
  return {
    minutes(charge, kind, changes) {
      const shelf = changes.find((one) => one.shelf?.type === charge.type)?.shelf;
      const amps = changes.find((one) => one.amps?.kind === kind)?.amps?.amps;
      const ways: Way[] = [charge.way];
      if (charge.way === 'group-by-group' && changes.some((one) => one.paralleledAllowed)) ways.push('paralleled');
      const found = ways
        .map((way) => wayMinutes(way, charge, kind, shelf?.volts ?? charge.fromVolts, amps))
        .filter((minutes) => minutes !== null);
      if (found.length > 0) return Math.min(...found);
      // What has really run there can run there, whatever the numbers of the channel say by now.
      return kind === charge.kind ? (charge.heldToAt - charge.heldFromAt) / 60_000 : null;
    },
    between(type, kind, fromVolts, toVolts) {
      const table = tableOf(type, kind, 'string', undefined);
      const of = types[type]!;
      return table && table(socOf(of, fromVolts), socOf(of, toVolts));
    },
  };
}

const loadOf: Record<Way, Load> = {
  terminals: 'string',
  'group-by-group': 'group',
  paralleled: 'joined',
  resistor: 'string',
};

const socOf = ({ curve }: ReplayType, volts: number): number =>
  socAtVolts(curve, Math.min(curve.volts.at(-1)!, Math.max(curve.volts[0]!, volts)));

/** Times of one charge of the rated capacity on a kind; null: the channel does not fit the load. */
function tableFor(type: ReplayType, kind: ReplayKind, load: Load, ampsAsked: number | undefined): Minutes | null {
  if (load === 'string' ? kind.singleGroup && type.groups > 1 : !kind.singleGroup && !kind.adjustableVolts) return null;
  const inSeries = load === 'string' ? type.groups : 1;
  const joined = load === 'joined' ? type.groups : 1;
  const capVolts = Math.min(type.capVolts, kind.maxVolts / inSeries);
  const byWatts = kind.maxWatts === null ? Infinity : kind.maxWatts / (inSeries * capVolts);
  const amps = Math.min(ampsAsked ?? kind.maxAmps, type.maxChargeAmps * joined, byWatts);
  const groupOhm = type.groupOhm / joined + kind.leadOhm / inSeries;
  const middle = type.curve.volts[Math.floor(type.curve.volts.length / 2)]!;
  const byLoad = kind.loadOhm === null ? null : (inSeries * middle) / (kind.loadOhm + inSeries * groupOhm);
  const down = kind.dischargeAmps ?? byLoad;
  return runMinutes({
    curve: type.curve,
    capacityAh: type.ratedAh * joined,
    groupOhm,
    charge: amps > 0 ? { amps, capVolts } : null,
    discharge:
      down === null || down <= 0
        ? null
        : { amps: Math.min(down, type.maxDischargeAmps * joined), floorVolts: type.floorVolts },
  });
}
