/** The rows of a past charge, as its life would have left them. */
import { judgeCheck, reckonCharge } from '@/calc/index';
import type { CheckCode } from '@/shared/contract/charge';
import type { ChannelHold } from '../entities/channel-hold';
import type { Charge } from '../entities/charge';
import type { ChargeReading } from '../entities/charge-reading';
import type { CheckAnswer } from '../entities/check-answer';
import type { LookIn } from '../entities/look-in';
import type { RestCheck } from '../entities/rest-check';
import type { RunStretch } from '../entities/run-stretch';
import type { Spare } from '../entities/spare';
import type { SpareReading } from '../entities/spare-reading';
import { lookInTimes } from '../services/charge-look-ins';
import { demoWorkshopId as workshopId } from './demo-workshop';
import { channelId, handMeterId, typeId } from './equipment';
import type { PastCharge } from './past-charges';
import { demoPeople } from './people';
import { shown, type Noise } from './noise';

const MINUTE = 60_000;
const DAY = 86_400_000;

export interface PastNames {
  /** 'C-0001' */
  number: string;
  /** 'R-2180' */
  repairRef: string;
  spareLabel: string;
}

export const pastSpareId = (past: PastCharge): string => `demo-past-spare-${past.repair}`;
const personId = (past: PastCharge): string => demoPeople[past.asked.by].id;
const readyAt = (past: PastCharge): number | null => (past.end === 'fitted' ? past.checkedAt : null);
/** The module goes in within the hour. */
const closedAt = (past: PastCharge): number =>
  (past.checkedAt ?? past.currentEndAt) + (past.end === 'fitted' ? 25 : 4) * MINUTE;

export function pastCharge(past: PastCharge, { number, repairRef }: PastNames): Charge {
  const { option, frozen } = past.plan;
  const { startedAt, currentEndAt } = past;
  const planned = (seconds: number): number => startedAt + Math.round((seconds - option.currentStartS) * 1000);
  const stopped = past.end === 'stopped';
  return {
    id: past.key,
    workshopId,
    number,
    repairRef,
    modulePosition: String(1 + (past.repair % 16)),
    spareId: pastSpareId(past),
    repairId: null,
    neighbourSpareId: null,
    moduleTypeId: typeId(past.asked.type),
    personId: personId(past),
    createdById: personId(past),
    stage: stopped ? 'stopped' : past.end === 'fitted' ? 'fitted' : 'shelved',
    heldFrom: null,
    direction: option.direction,
    way: option.way,
    finish: option.finish,
    targetVolts: past.asked.target,
    toleranceVolts: frozen.target.toleranceVolts,
    targetMeterId: handMeterId,
    targetCelsius: 21,
    minRestS: Math.round(option.restS),
    option,
    frozen,
    reckoning: { at: past.checkedAt ?? currentEndAt, reckoning: reckoningOf(past) },
    readyBy: null,
    clipOnAt: startedAt - Math.round(option.currentStartS * 1000),
    plannedEarlyAt: planned(option.totalS.p10),
    plannedLikelyAt: planned(option.totalS.p50),
    plannedLateAt: planned(option.totalS.p90),
    earlyAt: null,
    likelyAt: null,
    lateAt: null,
    queuedAt: null,
    startedAt,
    taperAt: taperAt(past),
    currentEndAt,
    currentOffSaid: true,
    checkDueAt: stopped ? null : past.checkDueAt,
    checkedAt: past.checkedAt,
    readyAt: readyAt(past),
    closedAt: closedAt(past),
    heldAt: null,
    stoppedAt: stopped ? currentEndAt : null,
    stopReason: stopped ? stopReasons[past.repair % stopReasons.length]! : null,
    topUpOf: past.topUpOf,
    nextDueAt: null,
    rev: 6,
    createdAt: past.asked.askedAt,
  };
}

export const stopReasons = [
  'The channel was needed for a customer who waits',
  'A clip had come off the second group',
  'The supply showed an error and switched itself off',
];

function taperAt({ run, startedAt, currentEndAt }: PastCharge): number | null {
  const at = run.taperS === null ? null : startedAt + Math.round(run.taperS * 1000);
  return at === null || at >= currentEndAt ? null : at;
}

function reckoningOf(past: PastCharge) {
  const { frozen, option } = past.plan;
  const endS = (past.currentEndAt - past.startedAt) / 1000;
  return reckonCharge({
    module: frozen.module,
    spare: frozen.spare,
    target: frozen.target,
    channels: frozen.channels,
    resistors: [],
    workshop: frozen.workshop,
    option,
    celsius: frozen.celsius,
    runs: [{ fromS: 0, toS: endS, stepIndex: 0 }],
    readings: [],
    currentOffAtS: endS,
    nowS: ((past.checkedAt ?? past.currentEndAt) - past.startedAt) / 1000,
    seed: frozen.seed,
    samples: 8,
  });
}

export const pastHold = (past: PastCharge): ChannelHold => ({
  id: `${past.key}-hold`,
  workshopId,
  chargeId: past.key,
  stepIndex: 0,
  channelId: channelId(past.wish.channel),
  state: 'released',
  fromAt: past.startedAt,
  toAt: past.currentEndAt,
});

export const pastRun = (past: PastCharge): RunStretch => ({
  id: `${past.key}-run`,
  workshopId,
  chargeId: past.key,
  fromAt: past.startedAt,
  toAt: past.currentEndAt,
  reason: past.end === 'stopped' ? 'stopped' : 'switched off',
  personId: personId(past),
});

/** Somebody was there once an hour, a few minutes late or early; one visit in twelve was missed. */
export function pastLookIns(past: PastCharge, noise: Noise): LookIn[] {
  const until = past.end === 'stopped' ? past.currentEndAt : past.checkDueAt;
  const times = lookInTimes(past.startedAt, until, past.plan.frozen.workshop.lookInIntervalS);
  return times.map((dueAt, place) => {
    const missed = noise.chance(1 / 12);
    return {
      id: `${past.key}-look-${place}`,
      workshopId,
      chargeId: past.key,
      dueAt,
      doneAt: missed ? null : dueAt + Math.round(noise.between(-4, 7)) * MINUTE,
      personId: missed ? null : personId(past),
      note: null,
    };
  });
}

/** Volts and amps at the visits that current flowed at, off the plan's own course by what a display scatters. */
export function pastReadings(past: PastCharge, lookIns: readonly LookIn[], noise: Noise): ChargeReading[] {
  const { option } = past.plan;
  const step = option.steps[0]!;
  const across = step.way === 'paralleled' ? 1 : step.groupIndexes.length;
  const stretch = (past.currentEndAt - past.startedAt) / 1000 / Math.max(1, step.stopS - step.startS);
  const visits = [past.startedAt + 9 * MINUTE, ...lookIns.flatMap(({ doneAt }) => (doneAt === null ? [] : [doneAt]))];
  return visits
    .filter((at) => at < past.currentEndAt - MINUTE)
    .map((at, place) => {
      const s = step.startS + (at - past.startedAt) / 1000 / stretch;
      const point = option.trace.findLast((one) => one.s <= s) ?? option.trace[0]!;
      return {
        id: `${past.key}-read-${place}`,
        workshopId,
        chargeId: past.key,
        at,
        terminalVolts: shown(point.clipVolts * across + 0.004 * noise.normal(), 2),
        amps: shown(point.amps * (1 + 0.003 * noise.normal()), 1),
        celsius: Math.round(noise.between(20, 26)),
        groupVolts: null,
        meterId: `demo-meter-${past.wish.channel}`,
        personId: personId(past),
        takenAt: 'supply',
        source: 'typed',
        replacesId: null,
        replacedById: null,
        reason: null,
        createdAt: at,
      };
    });
}

const codes: CheckCode[] = [
  'isolation',
  'polarity',
  'condition',
  'temperature',
  'ceiling',
  'ventilation',
  'attendance',
];

export const pastAnswers = (past: PastCharge): CheckAnswer[] =>
  codes.map((code, place) => ({
    id: `${past.key}-check-${code}`,
    workshopId,
    chargeId: past.key,
    code,
    answer: 'yes',
    note: code === 'temperature' ? '21\u00a0°C, allowed 10–45\u00a0°C' : null,
    personId: personId(past),
    at: past.startedAt - (codes.length - place) * 40_000,
    replacedAt: null,
  }));

export function pastRestCheck(past: PastCharge): RestCheck | null {
  if (past.checkedAt === null) return null;
  const { target, module, spare } = past.plan.frozen;
  return {
    id: `${past.key}-rest-check`,
    workshopId,
    chargeId: past.key,
    at: past.checkedAt,
    groupVolts: past.checkVolts,
    celsius: 22,
    meterId: handMeterId,
    personId: personId(past),
    verdict: judgeCheck(past.checkVolts, target, module, spare.capacityAh),
    early: false,
    createdAt: past.checkedAt,
  };
}

/** The spare of a repair: gone from the stock with its last charge. */
export const pastSpare = (last: PastCharge, label: string): Spare => ({
  id: pastSpareId(last),
  workshopId,
  label,
  moduleTypeId: typeId(last.asked.type),
  shelfPlace: null,
  capacityAh: last.asked.capacityAh,
  healthPercent: null,
  capacitySource: 'measured',
  capacitySdAh: null,
  condition: 'sound',
  quarantineReason: null,
  quarantinedAt: null,
  quarantinedById: null,
  fittedAt: closedAt(last),
  note: null,
  rev: 3,
  createdAt: last.asked.askedAt - 40 * DAY,
});

/** The reading the charge was planned from, and the one after its rest. */
export function pastSpareReadings(past: PastCharge): SpareReading[] {
  const row = (key: string, at: number, groupVolts: number[], note: string | null): SpareReading => ({
    id: `${past.key}-${key}`,
    workshopId,
    spareId: pastSpareId(past),
    at,
    groupVolts,
    celsius: 21,
    meterId: handMeterId,
    personId: personId(past),
    note,
    createdAt: at,
  });
  const before =
    past.topUpOf === null ? [row('before', past.plan.frozen.spareReadAt, past.asked.groupVolts, null)] : [];
  return past.checkedAt === null
    ? before
    : [...before, row('after', past.checkedAt, past.checkVolts, 'Check after the rest')];
}
