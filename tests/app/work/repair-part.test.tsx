import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { RepairWorkPart } from '@/shared/screens/work/repair-work-part';
import type { RepairDto } from '@/shared/contract/repair';
import type { WorkDto } from '@/shared/contract/work';
import { draw, emptyDevice, problem } from '../charges/bench-of';
import { bram, brakes, iso, listOf, now, workServer, type WorkServer } from './works';

let server: WorkServer;
const go = vi.fn();
function open(state: RepairDto['state'], answers: object) {
  server = workServer('technician');
  Object.assign(server.answers, answers);
  draw(<RepairWorkPart repair={{ id: 'r1', state }} now={now} onGo={go} />);
}
const part = async () => within(await screen.findByRole('region', { name: 'Other work' }));
const openWork = 'GET /api/work?state=open&repairId=r1';
const overWork = 'GET /api/work?state=over&repairId=r1';

beforeEach(() => {
  emptyDevice();
  go.mockClear();
});
afterEach(() => vi.unstubAllGlobals());

describe('the other work of a repair', () => {
  it('is listed, the open before what is over, without its number again; more is added for this repair', async () => {
    const done: WorkDto = { ...brakes, id: 'w3', title: 'Seal the lid', state: 'done' };
    open('open', {
      [openWork]: () => Response.json(listOf([brakes], 1)),
      [overWork]: () => Response.json(listOf([{ ...done, over: { at: iso('11:00'), by: bram, reason: null } }], 1)),
    });
    const rows = (await (await part()).findAllByRole('listitem')).map((row) => row.textContent);
    expect(rows).toHaveLength(2);
    expect(rows[0]).toMatch(/^Brake bleeddue .*Open$/);
    expect(rows[1]).toMatch(/^Seal the lid.*Done by Bram$/);
    fireEvent.click((await part()).getByRole('link', { name: 'Add other work' }));
    expect(go).toHaveBeenCalledWith('/work/new?repair=r1');
  });

  it('of a repair that was handed over without any is not spoken of', async () => {
    open('handed-over', {});
    await waitFor(() => expect(server.sent.filter(({ path }) => path.startsWith('/api/work'))).toHaveLength(2));
    await waitFor(() => expect(screen.queryByRole('region', { name: 'Other work' })).toBeNull());
  });

  it('that could not be read is read again on a press', async () => {
    open('open', { [openWork]: () => problem(400, 'Not so.') });
    const again = await (await part()).findByRole('button', { name: 'read it again' });
    server.answers[openWork] = () => Response.json(listOf([brakes]));
    fireEvent.click(again);
    await (await part()).findByRole('listitem');
  });
});
