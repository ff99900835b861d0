import { fireEvent, render, screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { FormatsProvider } from '@/shared/ui/format/formats';
import { layoutPack } from '@/shared/ui/pack-picture/layout';
import { PackPicture } from '@/shared/ui/pack-picture/pack-picture';
import { fittingOddText, packTwin } from '@/shared/ui/pack-picture/words';

const pairs = (count: number, per: number) => Array.from({ length: count }, (_, i) => String(Math.floor(i / per) + 1));
/** 96 groups at 3.968 V but module 17. */
const volts = Array.from({ length: 96 }, (_, i) => (i === 32 ? 3.871 : i === 33 ? 3.934 : 3.968 + (i % 3) * 0.001));
const pack = { groupVolts: volts, medianVolts: 3.969, odd: [32, 33], positions: pairs(96, 2) };

/** Boxes of a path: [x, y, width, height]. */
const boxes = (path: string) =>
  [...path.matchAll(/M([\d.-]+) ([\d.-]+)h([\d.-]+)v([\d.-]+)/g)].map((found) => found.slice(1).map(Number));

describe('the pack picture', () => {
  it('draws 94 healthy and 2 odd bars in two paths, lower for fewer volts, all on one foot', () => {
    const { healthy, odd, breakY } = layoutPack({ ...pack, worst: [32, 33], width: 358, height: 176 });
    expect(boxes(healthy)).toHaveLength(94);
    const [low, higher] = boxes(odd) as [number[], number[]];
    expect(low[1]!).toBeGreaterThan(higher[1]!);
    for (const [, y, , height] of [...boxes(healthy), ...boxes(odd)]) expect(y! + height!).toBeCloseTo(176, 1);
    expect(breakY).toBeLessThan(176);
  });

  it.each([
    [340, 'Module 17: G33 3.871 V, G34 3.934 V'],
    [240, 'Module 17: 3.871 V, 3.934 V'],
    [150, 'Module 17: 3.871 V'],
    [80, 'Module 17'],
  ])('calls the module out in %i px with as much as they hold, its name in any case', (room, text) => {
    const said = fittingOddText({ position: '17', groups: [32, 33] }, volts, 3.969, room);
    expect(said.replaceAll('\u00a0', ' ')).toBe(text);
  });

  it('keeps 100 mV as many times 10 mV in px, so that bars compare', () => {
    const at = (mV: number) => {
      const groupVolts = [4, 4, 4 - mV / 1000, 3.8];
      const drawn = layoutPack({
        groupVolts,
        medianVolts: 4,
        odd: [2],
        positions: pairs(4, 1),
        width: 100,
        height: 200,
      });
      return boxes(drawn.odd)[0]![1]! - drawn.medianY;
    };
    expect(at(100) / at(10)).toBeCloseTo(10, 1);
  });

  it.each([
    [1, 1],
    [120, 120],
    [400, 100],
    [400, 400],
  ])('%i groups stay within the width: %i shapes', (count, shapes) => {
    const positions = pairs(count, count / (count > 120 ? shapes : count));
    const groupVolts = Array.from({ length: count }, (_, i) => 3.7 + (i % 7) / 1000);
    const drawn = layoutPack({ groupVolts, medianVolts: 3.703, odd: [], positions, width: 358, height: 176 });
    const all = boxes(drawn.healthy);
    expect(all).toHaveLength(shapes);
    for (const [x, y, width, height] of all) {
      expect(x! + width!).toBeLessThanOrEqual(358);
      expect(y!).toBeGreaterThanOrEqual(0);
      expect(y! + height!).toBeLessThanOrEqual(176.01);
    }
    expect(drawn.breakY === null).toBe(count > 120);
  });

  it('names module and volts of what is odd to readers, and says so where nothing is', () => {
    expect(packTwin(pack)).toContain('Odd: Module 17: G33 3.871\u00a0V, G34 3.934\u00a0V.');
    expect(packTwin({ ...pack, odd: [] })).toContain('No group stands out.');
  });

  it('opens the list of all 96 groups, the odd ones named', async () => {
    render(
      <FormatsProvider languageTag="en-GB" zone="UTC">
        <PackPicture {...pack} />
      </FormatsProvider>,
    );
    fireEvent.click(screen.getByRole('button', { name: /List all groups/ }));
    const sheet = within(await screen.findByRole('dialog'));
    expect(sheet.getAllByRole('row')).toHaveLength(97);
    expect(sheet.getAllByText('17, odd')).toHaveLength(2);
  });
});
