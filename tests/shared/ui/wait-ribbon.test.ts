import { describe, expect, it } from 'vitest';
import type { Band, Segment } from '@/calc/plan-types';
import { stillRunning } from '@/shared/ui/wait-ribbon/comb';
import { layoutRibbon } from '@/shared/ui/wait-ribbon/layout';
import { clockTicks, spanTicks, tickStep } from '@/shared/ui/wait-ribbon/ticks';
import { ribbonTwin } from '@/shared/ui/wait-ribbon/twin';

// The px below were printed by the drawing functions of the look's specification for the same charges, by hand. They
// reckon in minutes; a ribbon only knows ratios of time.
const minutes = (rows: [Segment['kind'], number, number][]): Segment[] =>
  rows.map(([kind, from, to]) => ({ kind, fromS: from * 60, toS: to * 60 }));
const band = (p10: number, p50: number, p90: number): Band => ({ p10: p10 * 60, p50: p50 * 60, p90: p90 * 60 });

const live = {
  segments: minutes([
    ['cc', 710, 832],
    ['taper', 832, 865],
    ['rest', 865, 925],
    ['check', 925, 930],
  ]),
  fromS: 705 * 60,
  toS: 960 * 60,
  width: 358,
  height: 46,
  padTop: 18,
  padBottom: 12,
  nowS: 822 * 60,
  band: band(915, 930, 955),
  lookIns: [
    { s: 770 * 60, state: 'done' as const },
    { s: 830 * 60, state: 'next' as const },
    { s: 890 * 60, state: 'later' as const },
  ],
};

describe('wait ribbon of a running charge', () => {
  const drawing = layoutRibbon(live);

  it('stands on its line at 64 of 76 px', () => {
    expect([drawing.height, drawing.lineY]).toEqual([76, 64]);
  });

  it('draws constant current as a block, the taper as 12 falling steps, the rest 24 % high', () => {
    expect(drawing.shapes.map((shape) => shape.d)).toEqual([
      'M7.02 64V18H178.3V64z',
      'M178.3 64V18L182.16 26.14L186.02 32.48L189.88 37.41L193.74 41.26L197.6 44.25L201.46 46.58L205.32 48.4L209.18 49.81L213.05 50.91L216.91 51.77L220.77 52.44L224.63 52.96V64z',
      'M224.63 64V52.96H308.86V64z',
    ]);
    expect(drawing.shapes.map((shape) => shape.color)).toEqual(['charging', 'tapering', 'resting']);
  });

  it('is done up to the now line at 164.26, whose foot stands under the line', () => {
    expect(drawing.doneWidth).toBe(164.26);
    expect(drawing.now?.stem).toBe('M164.26 14V69');
    expect(drawing.now?.foot).toBe('M164.26 67l-5.5 8h11z');
  });

  it('combs every 5 px from 15:15 to 15:55, ten slats, and caps the likely 15:30 at 315.88', () => {
    expect(drawing.slats).toHaveLength(10);
    expect(drawing.slats[0]).toBe('M294.82 64V22.6');
    expect(drawing.slats[3]).toBe('M309.82 64V35.71');
    expect(drawing.slats[4]).toBe('M324.82 64V45.69');
    expect(drawing.slats[9]).toBe('M349.82 64V58.79');
    expect(drawing.likely).toEqual({ slat: 'M315.88 64V18', cap: 'M315.88 19l-6 -8h12z' });
  });

  it('pegs the look-ins above: done filled, next larger, later small', () => {
    expect(drawing.pegs.map(({ x, y, r, filled }) => [x, y, r, filled])).toEqual([
      [91.25, 7, 4.5, true],
      [175.49, 7, 5.5, false],
      [259.73, 7, 4, false],
    ]);
    expect(drawing.pegs[0]?.stem).toBe('M91.25 10V64');
  });
});

describe('wait ribbon of a discharge', () => {
  const drawing = layoutRibbon({
    segments: minutes([
      ['cc', 785, 953],
      ['taper', 953, 975],
      ['rest', 975, 1035],
      ['check', 1035, 1040],
    ]),
    fromS: 690 * 60,
    toS: 1110 * 60,
    width: 752,
    height: 78,
    padTop: 12,
    padBottom: 4,
    nowS: 822 * 60,
    band: band(1015, 1040, 1085),
    hanging: true,
    slat: 8,
  });

  it('hangs from its line at 12 px', () => {
    expect(drawing.lineY).toBe(12);
    expect(drawing.shapes[0]?.d).toBe('M170.1 12V90H470.9V12z');
    expect(drawing.shapes[2]?.d).toBe('M510.29 12V30.72H617.71V12z');
  });

  it('has the wall’s comb of 3 px slats every 8 px, and its cap points up from below', () => {
    expect(drawing.slatWidth).toBe(3);
    expect(drawing.slats).toHaveLength(14);
    expect(drawing.slats[0]).toBe('M581.9 12V82.2');
    expect(drawing.likely?.cap).toBe('M626.67 89l-6 8h12z');
  });
});

describe('wait ribbon that runs off the shared axis', () => {
  const drawing = layoutRibbon({
    segments: minutes([
      ['hands', 0, 10],
      ['cc', 10, 168],
      ['taper', 168, 200],
      ['hands', 200, 205],
      ['cc', 205, 363],
      ['taper', 363, 395],
      ['rest', 395, 450],
      ['check', 450, 455],
    ]),
    fromS: 0,
    toS: 310 * 60,
    width: 358,
    height: 24,
    padTop: 7,
    band: band(415, 455, 510),
  });

  it('ends in two slanted strokes and shows neither comb nor likely finish', () => {
    expect(drawing.overrun).toEqual({ halo: 'M353 34l6 -30', strokes: 'M346 32l6 -26M353 32l6 -26' });
    expect(drawing.slats).toEqual([]);
    expect(drawing.likely).toBeNull();
  });

  it('draws hands-on as a block of half height', () => {
    expect(drawing.shapes[0]).toEqual({ d: 'M0 31V19H11.55V31z', color: 'ink3', tint: 'well' });
  });

  it('does not run off when the latest finish is the end of the axis', () => {
    expect(layoutRibbon({ ...live, toS: live.band.p90 }).overrun).toBeNull();
  });
});

describe('wait ribbon in other states', () => {
  it('draws the queue as dots at a tenth of the height', () => {
    const drawing = layoutRibbon({
      segments: minutes([
        ['queue', 822, 840],
        ['cc', 840, 930],
      ]),
      fromS: 815 * 60,
      toS: 1090 * 60,
      width: 358,
      height: 30,
      padTop: 8,
      padBottom: 10,
    });
    expect(drawing.queues).toEqual(['M9.11 35H32.55']);
    expect(drawing.doneWidth).toBeNull();
  });

  it('cuts a stopped charge off where it was stopped, with no comb', () => {
    const drawing = layoutRibbon({ ...live, stoppedAtS: 771 * 60 });
    // 771 min is 66 of 255 min along 358 px: 92.66.
    expect(drawing.shapes.map((shape) => shape.d)).toEqual(['M7.02 64V18H92.66V64z']);
    expect(drawing.slats).toEqual([]);
    expect(drawing.stop).toBe('M92.66 18V64');
  });

  it('hatches a held charge from the hold on', () => {
    const drawing = layoutRibbon({ ...live, heldFromS: 822 * 60 });
    const starts = [...(drawing.hatch?.d ?? '').matchAll(/M([\d.]+)/g)].map(([, x]) => Number(x));
    expect(starts.length).toBeGreaterThan(20);
    expect(Math.min(...starts)).toBe(164.26);
    expect(layoutRibbon(live).hatch).toBeNull();
  });
});

describe('comb', () => {
  it('falls from 90 % at the earliest over 50 % at the likely to 10 % at the latest finish', () => {
    const b = band(160, 185, 245);
    const at = (minute: number) => stillRunning(minute * 60, b);
    expect([at(160), at(185), at(245)].map((x) => x.toFixed(6))).toEqual(['0.900000', '0.500000', '0.100000']);
    // half way from likely to latest: half way from 50 to 10 %
    expect(at(215)).toBeCloseTo(0.3, 9);
    expect(at(100_000)).toBe(0);
  });
});

describe('time axis', () => {
  it('ticks on round hours of the zone, also one that is 5 h 45 ahead of UTC', () => {
    // 9 June 2026 06:00 UTC is 11:45 in Kathmandu (UTC+05:45, tz database).
    const zeroInstant = Date.UTC(2026, 5, 9, 6, 0);
    const ticks = clockTicks({ zeroInstant, fromS: 0, toS: 3 * 3600, width: 358, zone: 'Asia/Kathmandu', stepS: 3600 });
    expect(ticks).toEqual([
      { s: 900, text: '12:00' },
      { s: 4500, text: '13:00' },
      { s: 8100, text: '14:00' },
    ]);
  });

  it('steps an hour on 255 min in 358 px, two hours on 9 h', () => {
    expect(tickStep(255 * 60, 358)).toBe(3600);
    expect(tickStep(9 * 3600, 358)).toBe(7200);
  });

  it('stand 90 px apart where a clock of twelve hours makes their words longer', () => {
    const axis = { zeroInstant: 0, fromS: 0, toS: 4 * 3600, width: 420, zone: 'UTC' };
    const apart = (hour12: boolean) => {
      const [first, second] = clockTicks({ ...axis, marks: { decimal: '.', hour12 } });
      return ((second!.s - first!.s) / axis.toS) * axis.width;
    };
    expect([apart(false), apart(true)]).toEqual([52.5, 105]);
  });

  it('counts from the clip-on: clip on, 1 h, 2 h, 3 h', () => {
    expect(spanTicks({ toS: 225 * 60, width: 358 }).map((tick) => tick.text.replaceAll('\u00a0', ' '))).toEqual([
      'clip on',
      '1 h',
      '2 h',
      '3 h',
    ]);
  });
});

describe('ribbon in words', () => {
  const at = (s: number) =>
    `${String(Math.floor(s / 3600)).padStart(2, '0')}:${String((s / 60) % 60).padStart(2, '0')}`;

  it('tells what is still to come, the finish and its band, as look.md §2 writes it', () => {
    expect(ribbonTwin({ segments: live.segments, band: live.band, at, nowS: live.nowS })).toBe(
      'Charging, constant current until 13:52, taper until 14:25, rest until 15:25; ready 15:30, between 15:15 and 15:55.',
    );
  });

  it('says discharging for a charge that hangs, and only the rest once the current is over', () => {
    expect(ribbonTwin({ segments: live.segments, band: live.band, at, hanging: true })).toMatch(
      /^Discharging, constant/,
    );
    expect(ribbonTwin({ segments: live.segments, band: live.band, at, nowS: 900 * 60 })).toBe(
      'Rest until 15:25; ready 15:30, between 15:15 and 15:55.',
    );
    expect(ribbonTwin({ segments: live.segments, at, stoppedAtS: 771 * 60 })).toBe('Stopped 12:51.');
  });
});
