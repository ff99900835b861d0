/** What people do to a charge in the course of a day, each as an act at its instant. */
import type { CheckCode } from '@/shared/contract/charge';
import type { KeepPlanRequest } from '@/shared/contract/plan';
import { currentOff, holdCharge, resumeCharge } from '../services/run-charge.service';
import { checkAfterRest, handOver } from '../services/finish-charge.service';
import { correctReading, logReading } from '../services/charge-readings.service';
import { keepPlan } from '../services/keep-plan.service';
import { lookIn } from '../services/look-ins.service';
import { reckonAt } from '../services/charge-reckoning';
import { answerCheck, queueCharge } from '../services/prepare-charge.service';
import { startCharge } from '../services/start-charge.service';
import { fileOf, type Act, type BenchDay } from './bench-day';
import { handMeterId } from './equipment';
import { shown, type Noise } from './noise';
import { demoPeople, memberOf, type DemoName } from './people';
import { bookRepairOf } from './repairs';

const MINUTE = 60_000;

export interface DayActs {
  keep(at: number, request: KeepPlanRequest): Act;
  /** Answers the checks that the numbers leave open, `count` of them. */
  answer(at: number, count?: number): Act;
  queue(at: number, clipOnAt: number): Act;
  start(at: number): Act;
  /** Reads volts, amps and degrees off the supply; `slip` types two digits the wrong way round. */
  read(at: number, slip?: 'slip'): Act;
  /** Puts the last reading right. */
  correct(at: number): Act;
  lookIn(at: number, note: string | null): Act;
  hold(at: number, reason: string): Act;
  resume(at: number): Act;
  off(at: number): Act;
  check(at: number): Act;
  pass(at: number, to: DemoName): Act;
}

/** Acts of one person on one charge. */
export function dayActs(day: BenchDay, charge: string, by: DemoName, noise: Noise): DayActs {
  const { deps } = day;
  const member = memberOf(by);
  const id = (): string => day.charges.get(charge)!.id;
  const rev = (): number => day.charges.get(charge)!.rev;
  const act = (at: number, run: (at: number) => Promise<unknown>): Act => ({
    at,
    charge,
    run: async (then) => void (await run(then)),
  });
  const reading = async (at: number) => {
    const file = await fileOf(deps.dataSource.manager, day, charge);
    const { charge: row } = file;
    const reckoned = reckonAt(file, at);
    const warmth = Math.min(6, (at - (row.startedAt ?? at)) / (20 * MINUTE));
    return {
      terminalVolts: shown(reckoned.terminalVolts + 0.004 * noise.normal(), 2),
      amps: shown(Math.abs(reckoned.amps) * (1 + 0.002 * noise.normal()), 1),
      celsius: shown(21 + warmth + noise.share(), 0),
      groupVolts: null,
      meterId: handMeterId,
    };
  };
  /** What the supply showed where something else was typed. */
  let meantVolts: number | null = null;
  return {
    keep: (at, request) =>
      act(at, async (now) => {
        await bookRepairOf(deps, by, request, now);
        day.remember(charge, await keepPlan(deps, member, request, now));
      }),
    answer: (at, count = 7) =>
      act(at, async (now) => {
        const codes: CheckCode[] = ['isolation', 'polarity', 'condition', 'ceiling', 'ventilation', 'attendance'];
        for (const [place, code] of codes.slice(0, count).entries())
          await answerCheck(deps, member, id(), { code, answer: 'yes', note: null }, now + place * 25_000);
      }),
    queue: (at, clipOnAt) =>
      act(at, (now) => queueCharge(deps, member, id(), rev(), { clipOnAt: new Date(clipOnAt).toISOString() }, now)),
    start: (at) => act(at, (now) => startCharge(deps, member, id(), rev(), {}, now)),
    read: (at, slip) =>
      act(at, async (now) => {
        const values = await reading(now);
        if (slip) meantVolts = values.terminalVolts;
        const typed = slip ? { ...values, terminalVolts: swapped(values.terminalVolts) } : values;
        await logReading(deps, member, id(), typed, now);
      }),
    correct: (at) =>
      act(at, async (now) => {
        const last = (await fileOf(deps.dataSource.manager, day, charge)).readings.at(-1)!;
        const { at: readAt, amps, celsius, groupVolts, meterId } = last;
        const right = { terminalVolts: meantVolts, amps, celsius, groupVolts, meterId };
        const reason = 'Two digits the wrong way round';
        await correctReading(
          deps,
          member,
          id(),
          last.id,
          { ...right, at: new Date(readAt).toISOString(), reason },
          now,
        );
      }),
    lookIn: (at, note) => act(at, (now) => lookIn(deps, member, id(), { note }, now)),
    hold: (at, reason) => act(at, (now) => holdCharge(deps, member, id(), rev(), { reason }, now)),
    resume: (at) => act(at, (now) => resumeCharge(deps, member, id(), rev(), {}, now)),
    off: (at) => act(at, (now) => currentOff(deps, member, id(), rev(), {}, now)),
    check: (at) =>
      act(at, async (now) => {
        const { charge: row } = await fileOf(deps.dataSource.manager, day, charge);
        const target = row.frozen.target.volts;
        const groupVolts = row.frozen.spare.groupVolts.map(() => shown(target + 0.0015 * noise.normal(), 3));
        await checkAfterRest(deps, member, id(), rev(), { groupVolts, celsius: 22, meterId: handMeterId }, now);
      }),
    pass: (at, to) => act(at, (now) => handOver(deps, member, id(), rev(), { personId: demoPeople[to].id }, now)),
  };
}

/** 11.46 for 11.64: tenths and hundredths the wrong way round; where they are alike, a tenth too much. */
function swapped(volts: number): number {
  const digits = volts.toFixed(2);
  const [tenths, hundredths] = digits.slice(-2);
  return tenths === hundredths ? shown(volts + 0.1, 2) : Number(`${digits.slice(0, -2)}${hundredths}${tenths}`);
}
