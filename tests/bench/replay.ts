import type { HistoryCharge, ReplayHistory } from '@/server/services/waits/replay-history';
import { newControl } from '@/server/services/waits/job-control';
import { makeWaitsSolver } from '@/server/services/waits/waits-solver';
import { seededRandom } from '@/calc/index';

const CHARGES = 20_000;
const DAY_MS = 86_400_000;
const begin = Date.parse('2024-06-03T06:00:00Z');

/** Two years of a workshop with nine channels of three kinds and two module types, 27 charges a day at all hours. */
export function twoYears(): ReplayHistory {
  const random = seededRandom(5);
  const charges = Array.from({ length: CHARGES }, (_, at): HistoryCharge => {
    const askedAt = begin + Math.floor((at / CHARGES) * 730 * DAY_MS);
    const heldFromAt = askedAt + Math.floor(random() * 3_600_000);
    const heldToAt = heldFromAt + Math.floor((0.5 + 3 * random()) * 3_600_000);
    return {
      ...{ id: `charge-${at}`, type: at % 2, kind: at % 3, way: 'terminals', askedAt, heldFromAt, heldToAt },
      ...{ bookedAt: askedAt - 7_200_000, dueAt: random() < 0.3 ? askedAt + DAY_MS : null },
      ...{ readyAt: heldToAt + 3_900_000, usedShare: random(), fromVolts: 3.3 + 0.1 * random() },
      ...{ toVolts: 3.5 + 0.2 * random(), groupAh: 60 + 6 * random() },
    };
  });
  const kind = (maxAmps: number) => ({
    ...{ count: 3, maxAmps, maxVolts: 60, maxWatts: null, leadOhm: 0.002, singleGroup: false, adjustableVolts: true },
    ...{ dischargeAmps: null, loadOhm: null },
  });
  const type = (groups: number) => ({
    ...{ curve: { soc: [0, 1], volts: [3, 4.1] }, groups, groupOhm: 0.002, ratedAh: 66, maxChargeAmps: 33 },
    ...{ maxDischargeAmps: 33, capVolts: 4.2, floorVolts: 2.8 },
  });
  return {
    charges,
    kinds: [kind(10), kind(20), kind(30)],
    types: [type(2), type(4)],
    hours: { zone: 'Europe/Berlin', workingHours: [...Array(6).fill({ from: '07:00', to: '20:00' }), null] },
    ...{ lookInMinutes: 60, unattended: false, hands: { clipOnS: 300, clipOffS: 300, busbarsS: 720 } },
  };
}

/** Four levers and the replay as things are, in the thread of the server. */
export async function benchReplay(): Promise<string[]> {
  const solver = makeWaitsSolver();
  try {
    const history = twoYears();
    const questions = [
      { moreOfKind: 1 },
      { amps: { kind: 0, amps: 15 } },
      { startAtBooking: true },
      { overnightAllowed: true },
    ];
    const ask = async (): Promise<number> => {
      const started = performance.now();
      const task = { kind: 'what-if' as const, history, questions, together: false, control: newControl() };
      const found = await solver.run(task);
      if (!found?.answers.every(({ enough }) => enough)) throw new Error('Not every lever was replayed.');
      return performance.now() - started;
    };
    const first = await ask();
    const later = Math.min(await ask(), await ask());
    return [
      `replay of ${CHARGES} charges × ${questions.length} levers and as things are, in a thread: ${later.toFixed(0)} ms, the first with the thread's start ${first.toFixed(0)} ms (promised: 2000 ms)`,
    ];
  } finally {
    await solver.close();
  }
}
