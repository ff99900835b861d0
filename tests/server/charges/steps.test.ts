import { afterEach, beforeEach, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import { act, alertsOf, at, boardOf, did, hour, makeBench, minute, running, seen, type Bench } from './bench';

let bench: Bench;
beforeEach(async () => {
  // One channel that clips to a single group: the two groups are charged one after the other.
  bench = await makeBench({ channels: [{ name: 'C1', singleGroup: true }] });
});
afterEach(() => bench.server.close());

async function twoSteps(): Promise<ChargeDto> {
  const charge = await running(
    bench,
    { spareId: await bench.spare('S-0422', [3.802, 3.83]), repairRef: 'R-9' },
    { way: 'group-by-group', channel: 'C1' },
  );
  expect(charge.option.steps.length).toBe(2);
  return charge;
}
const until = (instant: number) => bench.live(instant - bench.server.clock.now(), 2 * minute);
const firstEnd = (charge: ChargeDto): number =>
  at(charge.startedAt) + (charge.option.steps[0]!.stopS - charge.option.steps[0]!.startS) * 1000;

test('when a step has its charge the next one waits for a hand: alert, words, nothing flows, the finish moves', async () => {
  const charge = await twoSteps();
  await until(firstEnd(charge) + 10 * minute);
  const waiting = await seen(bench, charge.id);
  const group = charge.option.steps[1]!.groupIndexes[0]! + 1;
  expect(waiting.nextHand).toBe(`Swap C1 to group ${group}`);
  expect(waiting.stage).toBe('charging');
  expect(waiting.amps).toBe(0);
  const swap = (await alertsOf(bench)).find((alert) => alert.kind === 'step-swap')!;
  expect(swap).toMatchObject({ title: 'R-9 at C1', clearedAt: null, level: 'amber' });
  expect(swap.seen).toBe(`Step 1 of 2 has its charge. Swap C1 to group ${group}.`);
  expect(swap.checkFirst).toMatch(
    /^That C1 is off, before a clip is moved\. Then set C1 to [\d.]+\u00a0V, 10\u00a0A\.$/,
  );
  const ready = at(waiting.ready!.likely);
  await bench.live(hour, 5 * minute);
  const later = await seen(bench, charge.id);
  expect(Math.abs(at(later.ready!.likely) - ready - hour)).toBeLessThan(2 * minute);
  expect((await alertsOf(bench)).filter((alert) => alert.kind === 'step-swap')).toHaveLength(1);
  expect(later.deliveredAh).toBeCloseTo(charge.option.steps[0]!.ampHours, 1);
  expect((await boardOf(bench)).channels.find((channel) => channel.name === 'C1')!.chargeTitle).toBe('R-9');
});

test('the swap is said: the alert goes, the second step runs its own time, then the charge rests', async () => {
  const charge = await twoSteps();
  await until(firstEnd(charge) + 10 * minute);
  const swapped = await did(bench, await seen(bench, charge.id), 'next-step');
  expect(swapped.nextHand).toBeNull();
  expect(swapped.stepIndex).toBe(1);
  expect((await alertsOf(bench)).find((alert) => alert.kind === 'step-swap')!.clearedAt).not.toBeNull();
  const second = charge.option.steps[1]!;
  const end = at(swapped.currentEndAt) - bench.server.clock.now();
  // Its Ah over its 10 A.
  expect(end / ((second.ampHours / 10) * hour)).toBeCloseTo(1, 1);
  await until(at(swapped.currentEndAt) + 2 * minute);
  const resting = await seen(bench, charge.id);
  expect(resting.stage).toBe('resting');
  expect(resting.deliveredAh).toBeCloseTo(charge.option.steps[0]!.ampHours + second.ampHours, 0);
  expect((await act(bench, resting, 'next-step')).status).toBe(409);
});

test('before the last step "current off" is refused with what to do instead', async () => {
  const charge = await twoSteps();
  bench.server.clock.advance(10 * minute);
  const answer = await act(bench, charge, 'current-off');
  expect(answer.status).toBe(409);
  expect((answer.body as { detail: string }).detail).toContain('To interrupt, hold it.');
});

test('a step ended by hand, earlier than reckoned, is taken and said in the log', async () => {
  const charge = await twoSteps();
  bench.server.clock.advance(20 * minute);
  const swapped = await did(bench, charge, 'next-step');
  expect(swapped.stepIndex).toBe(1);
  expect(swapped.events.at(-1)!.text).toContain('earlier than reckoned');
  // A third of an hour at 10 A went in.
  expect(swapped.deliveredAh).toBeCloseTo(10 / 3, 1);
});

test('two channels side by side: both run from the start, the longer one ends the current, and no hand is asked for', async () => {
  const wide = await makeBench({
    channels: [
      { name: 'C1', singleGroup: true },
      { name: 'D1', singleGroup: true, maxAmps: 5 },
    ],
  });
  try {
    const charge = await running(
      wide,
      { spareId: await wide.spare('S-0422', [3.802, 3.83]), repairRef: 'R-9' },
      { way: 'group-by-group', channel: 'C1' },
    );
    expect(charge.channelNames).toEqual(['C1', 'D1']);
    expect(charge.amps).toBeCloseTo(15, 1);
    const board = await boardOf(wide);
    expect(board.channels.map((channel) => channel.chargeTitle)).toEqual(['R-9', 'R-9']);
    const hours = charge.option.steps.map((step) => step.ampHours / step.setAmps!);
    const longest = Math.max(...hours) * hour;
    expect((at(charge.currentEndAt) - at(charge.startedAt)) / longest).toBeCloseTo(1, 1);
    await wide.live(Math.min(...hours) * hour + 5 * minute, 5 * minute);
    const half = await seen(wide, charge.id);
    expect(half.nextHand).toBeNull();
    expect(half.amps!).toBeLessThan(11);
    await wide.live(at(half.currentEndAt) - wide.server.clock.now() + 2 * minute, 5 * minute);
    const resting = await seen(wide, charge.id);
    expect(resting.stage).toBe('resting');
    expect(resting.nextHand).toBe('Switch C1 and D1 off');
  } finally {
    await wide.server.close();
  }
});
