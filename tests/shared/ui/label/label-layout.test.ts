import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { labelSize, layoutLabel, widthShare, type LabelText } from '@/shared/contract/label-layout';
import { labelOf, noLabelReason } from '@/shared/contract/label-words';
import { labelForms } from '@/shared/ui/label/label-forms';
import { pointMarks } from '@/shared/ui/format/marks';
import { charge, iso, zone } from '../charge/charges';

const volts = (count: number) => Array.from({ length: count }, (_, i) => (3.94 + ((i * 7) % count) / 1000).toFixed(3));
const label = (count: number, more = {}) =>
  layoutLabel({
    title: 'R-2409',
    spare: 'S-0402',
    position: 'module 5',
    line: '2-series 66 Ah, to 3.964 V ±5 mV',
    volts: volts(count),
    ready: 'ready Tue 9 June 14:31, Ines',
    ...more,
  });

/** What a text covers: capitals and digits are .7 of the size high and stand on the baseline. */
const box = (text: LabelText) => {
  const width = widthShare(text.text) * text.size;
  const x0 = text.align === 'end' ? text.x - width : text.x;
  return { x0, x1: x0 + width, y0: text.y - 0.7 * text.size, y1: text.y };
};
type Box = ReturnType<typeof box>;
const meet = (a: Box, b: Box) => a.x0 < b.x1 && b.x0 < a.x1 && a.y0 < b.y1 && b.y0 < a.y1;

describe('the label of 62 × 40 mm', () => {
  it('keeps every mark on the paper and apart from each other, for 1 to 24 groups and any title up to 14 letters', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 24 }),
        fc.stringMatching(/^[A-Z]{1,3}-[0-9A-Z]{1,10}$/),
        fc.option(fc.constantFrom('module 5', 'module 112', 'module rear left')),
        (count, title, position) => {
          const { texts, mark, qr } = label(count, { title, position });
          const boxes: Box[] = [
            ...texts.map(box),
            { x0: mark.x, x1: mark.x + mark.size, y0: mark.y, y1: mark.y + mark.size },
            { x0: qr.x, x1: qr.x + qr.size, y0: qr.y, y1: qr.y + qr.size },
          ];
          for (const one of boxes) {
            expect(one.x0).toBeGreaterThanOrEqual(0);
            expect(one.x1).toBeLessThanOrEqual(labelSize.width - 2);
            expect(one.y1).toBeLessThanOrEqual(labelSize.height - 0.5);
          }
          const hits = boxes.flatMap((a, i) => boxes.slice(i + 1).filter((b) => meet(a, b)));
          expect(hits).toEqual([]);
        },
      ),
    );
  });

  it('prints the volts 5.6 mm large for 2 groups and 3.4 over 4, all of 12, and of 13 the lowest and the highest', () => {
    const sizes = (count: number) => label(count).texts.filter(({ key }) => /\dv$/.test(key));
    expect(sizes(2).map(({ size }) => size)).toEqual([5.6, 5.6]);
    expect(sizes(5).every(({ size }) => size === 3.4)).toBe(true);
    expect(sizes(12)).toHaveLength(12);
    expect(sizes(13).map(({ text }) => text)).toEqual(['3.940', '3.952']);
  });

  it('has a QR picture of 24 mm and the repair 9 mm high', () => {
    expect(label(2).qr.size).toBe(24);
    const title = label(2).texts.find(({ key }) => key === 'title')!;
    expect(title.size * 0.7).toBeGreaterThan(8.5);
  });
});

describe('what stands on the label', () => {
  const groups = [
    { group: 0, volts: 3.966, deviationVolts: 0.002, within: true, ampHoursToGo: -0.1 },
    { group: 1, volts: 3.962, deviationVolts: -0.002, within: true, ampHoursToGo: 0.1 },
  ];
  const check = {
    id: 'k',
    at: iso('14:31'),
    by: { id: 'ines', name: 'Ines Marlow' },
    groupVolts: [3.966, 3.962],
    celsius: 21,
    early: false,
    verdict: { within: true, groups, spreadVolts: 0.004, worstGroup: 0 },
  };

  it('is the repair, the spare, the module, the target, the groups, and who found it ready when', () => {
    const ready = charge('ready', { modulePosition: '5', targetVolts: 3.964, restChecks: [check] });
    expect(labelOf(ready, labelForms(zone, pointMarks))).toEqual({
      title: 'R-2411',
      spare: 'S-0398',
      position: 'module 5',
      line: '3-series 78 Ah, to 3.964\u00a0V ±5\u00a0mV',
      volts: ['3.966', '3.962'],
      ready: 'ready Tue\u00a09\u00a0June 14:31, Ines',
    });
  });

  it('is never printed for what is not ready or was last found outside', () => {
    expect(noLabelReason(charge('ready', { restChecks: [check] }))).toBeNull();
    expect(noLabelReason(charge('check-due'))).toMatch(/not checked/);
    const outside = { ...check, verdict: { ...check.verdict, within: false } };
    expect(noLabelReason(charge('ready', { restChecks: [check, outside] }))).toMatch(/outside the tolerance/);
  });
});
