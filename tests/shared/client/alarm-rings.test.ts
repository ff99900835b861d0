import { describe, expect, it } from 'vitest';
import type { AlertDto } from '@/shared/contract/alert';
import type { AlertKind } from '@/shared/contract/alert-kinds';
import { mostUrgent, ringOf } from '@/shared/client/alarm-rings';
import type { Role } from '@/shared/contract/roles';
import { contours, vibrationOf, type SoundName } from '@/shared/client/sound-contours';

const raised = Date.parse('2026-06-09T11:00:00Z');
const alert = (kind: AlertKind, more: Partial<AlertDto> = {}): AlertDto => ({
  id: 'a1',
  kind,
  level: kind === 'overdue' ? 'alarm' : 'amber',
  chargeId: 'c1',
  title: 'R-2406',
  for: { id: 'ines', name: 'Ines' },
  forRole: null,
  turn: 0,
  seen: '',
  checkFirst: '',
  raisedAt: new Date(raised).toISOString(),
  lateByS: 0,
  takenBy: null,
  takenAt: null,
  passedAt: null,
  clearedAt: null,
  ...more,
});

const ines = { id: 'ines', role: 'technician' } as const;
const bram = { id: 'bram', role: 'technician' } as const;

/** Seconds after it was raised at which an alert sounds in half an hour, looked at every second. */
function rings(one: AlertDto, id = 'ines', until = 1800, role: Role = 'technician'): number[] {
  const heard: number[] = [];
  const person = { id, role };
  for (let s = 0; s <= until; s++) if (ringOf(one, person, raised + (s - 1) * 1000, raised + s * 1000)) heard.push(s);
  return heard;
}

describe('when an alert rings', () => {
  it('a check that is due rings at once, after 5 and after 15 min', () => {
    expect(rings(alert('check-due'))).toEqual([0, 300, 900]);
  });
  it('an overdue charge rings every 60 s until somebody has it', () => {
    expect(rings(alert('overdue'), 'ines', 300)).toEqual([0, 60, 120, 180, 240, 300]);
    expect(rings(alert('overdue', { takenBy: { id: 'bram', name: 'Bram' } }))).toEqual([]);
    expect(rings(alert('overdue', { clearedAt: new Date(raised).toISOString() }))).toEqual([]);
  });
  it('a finished charge whose current waits for a hand rings at once, after 5 and after 15 min', () => {
    expect(rings(alert('charge-done'))).toEqual([0, 300, 900]);
    expect(rings(alert('charge-done', { takenBy: { id: 'bram', name: 'Bram' } }))).toEqual([]);
  });
  it('a finished charge that ends by itself and a look-in ring once', () => {
    expect(rings(alert('charge-done', { level: 'tell' }))).toEqual([0]);
    expect(rings(alert('look-in-due', { level: 'tell' }))).toEqual([0]);
  });
  it('a look-in that was missed rings at once, after 5 and after 15 min', () => {
    expect(rings(alert('look-in-missed', { level: 'amber' }))).toEqual([0, 300, 900]);
  });
  it('an odd reading rings once, for everybody who is there', () => {
    expect(rings(alert('odd-reading', { level: 'alarm' }))).toEqual([0]);
    expect(rings(alert('odd-reading', { level: 'alarm' }), 'bram')).toEqual([0]);
  });
  it('passed on after 10 min it rings for the receiver from then, at 0, 5 and 15 min', () => {
    const passed = { ...alert('check-due'), passedAt: new Date(raised + 600_000).toISOString() };
    expect(rings(passed)).toEqual([600, 900, 1500]);
  });
  it('never heard on this device it rings however old it is, until it is taken', () => {
    expect(ringOf(alert('charge-done'), ines, null, raised + 7_200_000)).toBe('ready');
    expect(ringOf(alert('charge-done'), bram, null, raised + 7_200_000)).toBeNull();
    const taken = alert('charge-done', { takenBy: { id: 'bram', name: 'Bram' } });
    expect(ringOf(taken, ines, null, raised + 7_200_000)).toBeNull();
  });
  it('rings for its person and, as an alarm, for everybody', () => {
    expect(rings(alert('check-due'), 'bram')).toEqual([]);
    expect(rings(alert('check-due', { for: null }), 'bram')).toEqual([0, 300, 900]);
    expect(rings(alert('overdue'), 'bram', 60)).toEqual([0, 60]);
  });
  it('gone on because nobody took it, it rings for the foremen from then, and then for the managers too', () => {
    const gone = (forRole: 'foreman' | 'manager') =>
      alert('check-due', { forRole, passedAt: new Date(raised + 600_000).toISOString() });
    expect(rings(gone('foreman'), 'hella', 1800, 'foreman')).toEqual([600, 900, 1500]);
    expect(rings(gone('foreman'), 'mara', 1800, 'manager')).toEqual([]);
    expect(rings(gone('manager'), 'mara', 1800, 'manager')).toEqual([600, 900, 1500]);
    expect(rings(gone('foreman'), 'bram')).toEqual([]);
    // A wall's alert is nobody's but the foremen's.
    const wall = alert('wall-unseen', { level: 'tell', for: null, forRole: 'foreman' });
    expect(rings(wall, 'bram')).toEqual([]);
    expect(rings(wall, 'hella', 1800, 'foreman')).toEqual([0]);
  });
  it('over a limit of the type it rings every 60 s until somebody has it', () => {
    for (const kind of ['too-warm', 'over-voltage'] as const)
      expect(rings(alert(kind, { level: 'alarm' }), 'bram', 150)).toEqual([0, 60, 120]);
  });
  it('of several at once the most urgent is heard', () => {
    expect(mostUrgent(['look-in', 'ready', 'overdue', 'check-due'])).toBe('overdue');
    expect(mostUrgent(['look-in', 'check-due'])).toBe('check-due');
    expect(mostUrgent([])).toBeNull();
  });
});

describe('what it sounds like', () => {
  const all = Object.entries(contours) as [SoundName, (typeof contours)[SoundName]][];

  it.each(all)('%s stays within 200–900 Hz and under 700 ms', (_name, tones) => {
    for (const { hertz } of tones) {
      expect(hertz).toBeGreaterThanOrEqual(200);
      expect(hertz).toBeLessThanOrEqual(900);
    }
    expect(vibrationOf(tones).reduce((sum, ms) => sum + ms, 0)).toBeLessThan(700);
  });

  it('is told apart by number and direction of its tones: 1 low, 2 up, 3 up, 2 down, 1 tick', () => {
    const shape = (name: SoundName) =>
      contours[name]
        .slice(1)
        .map((tone, i) => (tone.hertz > contours[name][i]!.hertz ? 'up' : 'down'))
        .join(' ');
    expect(Object.fromEntries(all.map(([name]) => [name, shape(name)]))).toEqual({
      resting: '',
      'check-due': 'up',
      ready: 'up up',
      overdue: 'down',
      'look-in': '',
    });
    expect(contours.resting[0]!.hertz).toBeLessThan(300);
    expect(contours['look-in'][0]!.ms).toBeLessThan(100);
  });

  it('vibrates in the same pattern: on, off, on', () => {
    expect(vibrationOf(contours.overdue)).toEqual([260, 60, 320]);
  });
});
