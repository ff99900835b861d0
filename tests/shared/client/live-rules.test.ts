import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { liveRoots, makeLiveRules } from '@/shared/client/live-rules';
import type { WallChangeDto } from '@/shared/contract/board';

const at = '2026-06-09T11:42:00.000Z';

/** Notes what became old; answers with what the device has in its cache. */
function listening(cached: { board: number | null; charges?: Record<string, number> } = { board: null }) {
  const old: string[] = [];
  const rules = makeLiveRules({
    old: (root, id) => void old.push(id ? `${root} ${id}` : root),
    boardRev: () => cached.board,
    chargeRev: (id) => cached.charges?.[id] ?? null,
  });
  const board = (rev: number, chargeId: string | null = null) => rules.on('board:changed', { rev, at, chargeId });
  return { old, rules, board };
}

describe('announcements', () => {
  it('asks for the board, the bench plan and the one charge when the next revision is announced', () => {
    const { old, board } = listening({ board: 4 });
    board(5, 'c1');
    expect(old).toEqual(['board', 'charges', 'chargers', 'bench-plan', 'charge c1']);
  });

  it('asks for everything when a revision was missed', () => {
    const { old, board } = listening({ board: 4 });
    board(6, 'c1');
    expect(old).toEqual(expect.arrayContaining([...liveRoots]));
  });

  it('asks for nothing when the same revision is announced twice', () => {
    const { old, board } = listening({ board: 4 });
    board(5);
    old.length = 0;
    board(5);
    board(4);
    expect(old).toEqual([]);
  });

  it('hears by the heartbeat that an announcement was lost, once', () => {
    const { old, rules } = listening({ board: 4 });
    rules.on('heartbeat', { at, rev: 5 });
    expect(old).toEqual(expect.arrayContaining(['board', 'charge']));
    old.length = 0;
    rules.on('heartbeat', { at, rev: 5 });
    expect(old).toEqual([]);
  });

  it('asks for everything when the server went back to an older copy of its data', () => {
    const { old, rules } = listening({ board: 90 });
    rules.on('heartbeat', { at, rev: 12 });
    expect(old).toEqual(expect.arrayContaining([...liveRoots]));
  });

  it('asks for everything after a broken connection', () => {
    const { old, rules } = listening({ board: 4 });
    rules.reconnected();
    expect(old.sort()).toEqual([...liveRoots].sort());
  });

  it('does not ask for a charge whose newer state this device has just been answered', () => {
    const { old, rules } = listening({ board: 4, charges: { c1: 8 } });
    rules.on('charge:changed', { id: 'c1', rev: 8, at });
    expect(old).not.toContain('charge c1');
    rules.on('charge:changed', { id: 'c1', rev: 9, at });
    expect(old).toContain('charge c1');
  });
});

describe('a wall', () => {
  const change = { from: 4, rev: 5, cards: [], order: null, channels: null } as unknown as WallChangeDto;
  function wall(shown: number | null, puts: boolean) {
    const old: string[] = [];
    const state = { shown };
    const rules = makeLiveRules({
      old: (root) => void old.push(root),
      boardRev: () => state.shown,
      chargeRev: () => null,
      wall: { shown: () => state.shown, put: () => puts },
    });
    return { old, state, rules };
  }

  it('asks for nothing where what changed could be put on its board, and for the board where it could not', () => {
    const can = wall(4, true);
    can.rules.on('wall:changed', change);
    expect(can.old).toEqual([]);
    const cannot = wall(3, false);
    cannot.rules.on('wall:changed', change);
    expect(cannot.old).toEqual(['board']);
    const untold = wall(4, true);
    untold.rules.on('wall:changed', { from: null, rev: 5 });
    expect(untold.old).toEqual(['board']);
  });

  it('hears by the next heartbeat that the board it asked for is from before what it was told', () => {
    const { old, state, rules } = wall(null, false);
    rules.on('heartbeat', { at, rev: 5 });
    // An answer that was read before revision 5 and comes after it was told.
    state.shown = 4;
    old.length = 0;
    rules.on('heartbeat', { at, rev: 5 });
    expect(old).toContain('board');
    state.shown = 5;
    old.length = 0;
    rules.on('heartbeat', { at, rev: 5 });
    expect(old).toEqual([]);
  });
});

describe('lost, doubled and swapped announcements', () => {
  it('leave no charge old on the screen after the next heartbeat (2000 random histories)', () => {
    const fate = fc.constantFrom('comes', 'comes', 'comes', 'lost', 'doubled', 'late');
    const change = fc.record({ charge: fc.integer({ min: 0, max: 3 }), fate });
    fc.assert(
      fc.property(fc.array(change, { maxLength: 40 }), (changes) => {
        const server = { rev: 1, charges: [0, 0, 0, 0] };
        const screen = { rev: 1, charges: [0, 0, 0, 0] };
        const rules = makeLiveRules({
          // A question is answered by the present state: what a refetch does.
          old: (root, id) => {
            if (root === 'board') screen.rev = server.rev;
            if (root !== 'charge') return;
            if (id) screen.charges[Number(id)] = server.charges[Number(id)]!;
            else screen.charges = [...server.charges];
          },
          boardRev: () => screen.rev,
          chargeRev: (id) => screen.charges[Number(id)] ?? null,
        });
        const late: (() => void)[] = [];
        for (const { charge, fate: what } of changes) {
          server.rev += 1;
          server.charges[charge]! += 1;
          const event = { rev: server.rev, at, chargeId: String(charge) };
          const tell = () => rules.on('board:changed', event);
          if (what === 'late') late.push(tell);
          if (what === 'comes' || what === 'doubled') {
            tell();
            late.splice(0).forEach((one) => one());
          }
          if (what === 'doubled') tell();
        }
        rules.on('heartbeat', { at, rev: server.rev });
        expect(screen).toEqual(server);
      }),
      { numRuns: 2000 },
    );
  });
});
