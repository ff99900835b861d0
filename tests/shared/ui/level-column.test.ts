import { describe, expect, it } from 'vitest';
import { drawnGroups } from '@/shared/ui/level-column/groups';
import { layoutColumn, type ColumnInput } from '@/shared/ui/level-column/layout';
import { allNear, reachScale } from '@/shared/ui/level-column/scale';
import { columnSize } from '@/shared/ui/level-column/size';
import { columnTwin } from '@/shared/ui/level-column/twin';

// Every number of px below was printed by the drawing functions of the look's specification for the same charge, by
// hand; only the inputs are shared with the code under test.

const live: ColumnInput = {
  groups: [
    { volts: 3.855, beganVolts: 3.655, clipVolts: 3.884, text: '3.855' },
    { volts: 3.854, beganVolts: 3.656, clipVolts: 3.883, text: '3.854' },
    { volts: 3.849, beganVolts: 3.651, clipVolts: 3.879, text: '3.849' },
  ],
  targetVolts: 3.905,
  toleranceVolts: 0.005,
  scale: { kind: 'reach', lowVolts: 3.6, highVolts: 3.95 },
  size: columnSize('live', 3),
  stage: 'charging',
  labels: true,
  ends: true,
};

describe('level column on the live screen, 36/12/176', () => {
  const drawing = layoutColumn(live);

  it('is 184 by 220 px and puts the notch of 3.905 V at 44.63', () => {
    expect([drawing.width, drawing.height]).toEqual([184, 220]);
    expect(drawing.notchY).toBe(44.63);
    expect([drawing.x0, drawing.x1]).toEqual([32, 181]);
    expect(drawing.notchTab).toBe('M172 44.63l10 -6.5v13z');
  });

  it('fills G1 at 3.855 V from 69.77, 126.73 high, 3 px from the glass', () => {
    expect(drawing.vessels[0]?.fill).toEqual({ x: 43, y: 69.77, w: 30, h: 126.73 });
    expect(drawing.vessels[2]?.fill).toEqual({ x: 139, y: 72.79, w: 30, h: 123.71 });
  });

  it('marks where the charge began, the clips and the broken foot', () => {
    expect(drawing.vessels.map((vessel) => vessel.beganY)).toEqual([170.34, 169.84, 172.35]);
    expect(drawing.vessels[1]?.clipMark).toBe('M125 55.69l6 -4.5v9z');
    expect(drawing.vessels[0]?.foot).toBe('M37 189.68L79 181.68');
    expect(drawing.vessels[0]?.wall).toBe('M40 22v176h36v-176');
  });

  it('prints figures above, names below and the ends of the scale', () => {
    expect(drawing.vessels[2]?.figure).toEqual({ x: 154, y: 14, text: '3.849' });
    expect(drawing.vessels[2]?.name).toEqual({ x: 154, y: 215, text: 'G3' });
    expect(drawing.ends).toEqual([
      { x: 34, y: 32, text: '3.95' },
      { x: 34, y: 198, text: '3.60' },
    ]);
  });
});

describe('level column of a check, target ±40 mV', () => {
  const drawing = layoutColumn({
    groups: [
      { volts: 3.966, text: '+2' },
      { volts: 3.957, text: '−7', odd: true },
    ],
    targetVolts: 3.964,
    toleranceVolts: 0.005,
    scale: { kind: 'near' },
    size: columnSize('check', 2),
    stage: 'check-due',
    labels: true,
  });

  it('draws the tolerance at 99 and 121 around the notch at 110, its lines ending at the tab', () => {
    expect(drawing.notchY).toBe(110);
    expect(drawing.toleranceYs).toEqual([99, 121]);
    expect(drawing.toleranceX1).toBe(152);
    expect(drawing.vessels[0]?.strip).toEqual({ x: 10, y: 99, w: 62, h: 22 });
  });

  it('keeps an odd group amber with an outline, since the whole check asks for a person', () => {
    expect(drawing.vessels[1]?.fill).toEqual({ x: 93, y: 125.4, w: 56, h: 71.1 });
    expect(drawing.vessels.map((vessel) => [vessel.fillColor, vessel.outlined])).toEqual([
      ['checkDue', true],
      ['checkDue', true],
    ]);
  });
});

describe('level column with a group that is odd', () => {
  const drawing = layoutColumn({
    groups: [3.909, 3.91, 3.908, 3.875, 3.909, 3.907].map((volts) => ({ volts, odd: volts < 3.88 })),
    targetVolts: 3.912,
    toleranceVolts: 0.005,
    scale: { kind: 'near' },
    size: columnSize('wall', 6),
    stage: 'tapering',
  });

  it('gives six groups on the wall 18 px and 6 px between, 160 by 127 px in all', () => {
    expect([drawing.width, drawing.height]).toEqual([160, 127]);
  });

  it('fills G4 in alarm, 2.7 px high, and sets a triangle over it and over no other', () => {
    const [odd, healthy] = [drawing.vessels[3], drawing.vessels[0]];
    expect([odd?.fillColor, healthy?.fillColor]).toEqual(['alarm', 'tapering']);
    expect(odd?.fill).toEqual({ x: 85, y: 119.8, w: 12, h: 2.7 });
    expect(odd?.oddMark).toBe('M86 1h10l-5 8z');
    expect(healthy?.oddMark).toBeNull();
    expect(odd?.foot).toBe('M79 119.16L103 113.16');
  });
});

describe('level column of a refused spare', () => {
  it('draws the floor of 2.50 V at 139.5 on a window of 2.20–4.20 V', () => {
    const drawing = layoutColumn({
      groups: [{ volts: 2.41, odd: true }, { volts: 2.894 }],
      targetVolts: 3.968,
      toleranceVolts: 0.005,
      scale: { kind: 'window', lowVolts: 2.2, highVolts: 4.2 },
      size: columnSize('live', 2, { h: 150 }),
      stage: 'planned',
      ends: true,
      floorVolts: 2.5,
    });
    expect(drawing.floorY).toBe(139.5);
    expect(drawing.notchY).toBe(29.4);
    expect(drawing.vessels[1]?.fill).toEqual({ x: 91, y: 109.95, w: 30, h: 50.55 });
    expect(drawing.vessels[1]?.fillColor).toBe('ink3');
    expect(drawing.vessels.every((vessel) => vessel.foot === null)).toBe(true);
  });
});

describe('level column in a list', () => {
  it('has no tab, 41 by 66 px for two queued groups, and ends the notch 3 px outside', () => {
    const drawing = layoutColumn({
      groups: [{ volts: 3.612 }, { volts: 3.606 }],
      targetVolts: 3.968,
      toleranceVolts: 0.005,
      scale: { kind: 'window', lowVolts: 3, highVolts: 4.2 },
      size: columnSize('list', 2),
      stage: 'queued',
      tab: false,
    });
    expect([drawing.width, drawing.height]).toEqual([41, 66]);
    expect([drawing.x0, drawing.x1, drawing.notchY]).toEqual([1, 40, 14.6]);
    expect(drawing.vessels[1]?.fill).toEqual({ x: 25, y: 32.7, w: 10, h: 29.3 });
    expect(drawing.notchTab).toBeNull();
  });

  it('keeps a level beyond the scale inside the vessel', () => {
    const drawing = layoutColumn({ ...live, groups: [{ volts: 4.3 }, { volts: 3.1 }] });
    expect(drawing.vessels[0]?.fill.y).toBe(22);
    expect(drawing.vessels[1]?.fill.h).toBe(0);
  });
});

describe('many groups', () => {
  it('narrows over 8 groups to 6 px with 2 px between, and not at 8', () => {
    expect(columnSize('list', 8)).toMatchObject({ w: 9, gap: 3 });
    expect(columnSize('list', 9)).toMatchObject({ w: 6, gap: 2 });
    expect(columnSize('wall', 12)).toMatchObject({ w: 6, gap: 2, h: 112 });
  });

  it('draws all of 16 groups, of 17 only lowest, median and highest by their own names', () => {
    const groups = Array.from({ length: 17 }, (_, i) => ({ volts: 3.6 + ((i * 7) % 17) / 1000 }));
    expect(drawnGroups(groups.slice(0, 16))).toHaveLength(16);
    // (i·7) mod 17 runs through 0…16: 0 at i = 0, 8 at i = 6 (42 = 2·17 + 8), 16 at i = 12 (84 = 4·17 + 16).
    expect(drawnGroups(groups).map(({ rank, number }) => `${rank} G${number}`)).toEqual([
      'lowest G1',
      'median G7',
      'highest G13',
    ]);
  });
});

describe('scale', () => {
  it('reaches 50 mV beyond start and target, outward to the printed hundredth', () => {
    expect(reachScale([3.655, 3.656, 3.651], [3.855, 3.854, 3.849], 3.905)).toEqual({
      kind: 'reach',
      lowVolts: 3.6,
      highVolts: 3.96,
    });
  });

  it('comes near when every healthy group is within 40 mV, an odd one left aside', () => {
    expect(allNear([{ volts: 3.925 }, { volts: 3.962 }], 3.965)).toBe(true);
    expect(allNear([{ volts: 3.924 }, { volts: 3.962 }], 3.965)).toBe(false);
    expect(allNear([{ volts: 3.875, odd: true }, { volts: 3.962 }], 3.965)).toBe(true);
    expect(allNear([{ volts: 3.875, odd: true }], 3.965)).toBe(false);
  });
});

describe('column in words', () => {
  it('says stage, target and each group, and names the odd one with how far it is off', () => {
    expect(
      columnTwin({
        name: 'S-0371',
        groups: [{ volts: 3.909 }, { volts: 3.875, odd: true }],
        targetVolts: 3.912,
        toleranceVolts: 0.005,
        stage: 'tapering',
      }).replaceAll('\u00a0', ' '),
    ).toBe('S-0371: Tapering. Target 3.912 V, ±5 mV. G1 3.909 V, G2 3.875 V, odd, 37 mV below.');
  });

  it('of 20 groups tells three, and every odd one besides', () => {
    const groups = Array.from({ length: 20 }, (_, i) => ({ volts: 3.7 + i / 1000, odd: i === 4 }));
    const words = columnTwin({ groups, targetVolts: 3.75, toleranceVolts: 0.005, stage: 'charging' });
    expect(words.match(/G\d+/g)).toEqual(['G1', 'G10', 'G20', 'G5']);
  });
});
