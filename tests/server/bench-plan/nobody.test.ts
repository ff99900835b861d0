/** Look-ins that nobody can do: R-1 runs from 10:00 and asks for one each hour, R-2 is clipped on at 13:00. */
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { StaffingInput } from '@/shared/contract/staffing';
import { bytesOf } from '@/tests/support/bytes';
import { readPdf } from '@/tests/support/pdf';
import { hour, makeBench, running, type Bench } from '../charges/bench';
import { clock, hoursOf, onlyTwoWork, planOf, queued, timeOf } from './day';

const away = { daysOff: [{ from: '2026-06-09', to: '2026-06-09', note: null }] };
const first = (name: string): string => name.split(' ')[0]!;

describe('a look-in that nobody can do', () => {
  let bench: Bench;
  let chargeId: string;
  const technician = () => bench.server.own.people.technician;
  const foreman = () => bench.server.own.people.foreman;
  const ofTechnician = (change: Partial<StaffingInput>) => hoursOf(bench, technician().id, change);
  /** Of R-1 those from 11:00 on: when, whose, why nobody's. */
  const lookIns = async (count: number) =>
    (await planOf(bench)).charges
      .find(({ card }) => card.id === chargeId)!
      .lookIns.slice(0, count)
      .map(({ dueAt, person, nobody }) => [timeOf(dueAt), person?.id ?? null, nobody]);

  beforeEach(async () => {
    bench = await makeBench();
    await onlyTwoWork(bench);
    await hoursOf(bench, foreman().id, away);
    const spareId = await bench.spare('S-1', [3.7, 3.7]);
    chargeId = (await running(bench, { spareId, repairRef: 'R-1' }, { channel: 'A1' })).id;
    await queued(bench, { spareId: await bench.spare('S-2'), repairRef: 'R-2' }, 'B1', clock('13:00'));
  });
  afterEach(() => bench.server.close());

  it('in the only one’s break says until when that is, and while they clip on says at what and until when', async () => {
    await ofTechnician({ breaks: [{ from: '11:50', to: '12:30' }] });
    const name = first(technician().name);
    expect(await lookIns(3)).toEqual([
      ['11:00', technician().id, null],
      ['12:00', null, { kind: 'away', because: `${name} has a break until 12:30.` }],
      ['13:00', null, { kind: 'busy', because: `${name} clips on R-2 until 13:05. Nobody else is there.` }],
    ]);
  });

  it('that begins before the only one comes, or ends after they have left, says so', async () => {
    const hours = (from: string, to: string) => ({ hours: Array.from({ length: 7 }, () => ({ from, to })) });
    const name = first(technician().name);
    await ofTechnician(hours('08:00', '11:02'));
    expect(await lookIns(1)).toEqual([['11:00', null, { kind: 'away', because: `${name} is there until 11:02.` }]]);
    await ofTechnician(hours('11:03', '17:00'));
    expect(await lookIns(1)).toEqual([['11:00', null, { kind: 'away', because: `${name} is there from 11:03.` }]]);
  });

  it('on a day off of both names both, and where nobody has hours at all says that', async () => {
    await ofTechnician(away);
    const nobody = (await lookIns(1))[0]![2];
    const names = [foreman().name, technician().name].map(first).sort();
    expect(nobody).toEqual({ kind: 'away', because: `${names.join(' and ')} have the day off.` });
    const none = { hours: Array.from({ length: 7 }, () => null) };
    await ofTechnician(none);
    await hoursOf(bench, foreman().id, none);
    expect((await lookIns(1))[0]![2]).toEqual({ kind: 'away', because: 'Nobody has working hours then.' });
  });

  it('after the workshop’s hours says that it is closed, and so does the day sheet', async () => {
    bench.server.clock.set(Date.parse(clock('10:00')) + 6.9 * hour);
    const spareId = await bench.spare('S-3', [3.7, 3.7]);
    const late = await queued(bench, { spareId, repairRef: 'R-3' }, 'B1', clock('16:58'));
    const charge = (await planOf(bench)).charges.find(({ card }) => card.id === late.id)!;
    expect(charge.lookIns[0]).toMatchObject({
      person: null,
      nobody: { kind: 'away', because: 'The workshop is closed then.' },
    });
    const { bytes } = await bytesOf(bench.as('foreman').get('/api/bench-plan/day-sheet.pdf'));
    const text = (await readPdf(bytes))
      .map((page) => page.text)
      .join(' ')
      .replace(/\s+/g, ' ');
    expect(text).toContain(
      `R-3: Nobody can look in at ${timeOf(charge.lookIns[0]!.dueAt)}. The workshop is closed then.`,
    );
  });
});
