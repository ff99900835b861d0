import { describe, expect, it } from 'vitest';
import { contrastPairs, palettes, type ColorRole } from '@/shared/ui/theme/tokens';

/**
 * Contrast ratio by WCAG 2.2 (success criterion 1.4.3, definitions 'relative luminance' and 'contrast ratio'), written
 * here from the definition with the sRGB transfer function of IEC 61966-2-1.
 */
function luminance(hex: string): number {
  const [r, g, b] = [hex.slice(1, 3), hex.slice(3, 5), hex.slice(5, 7)].map((pair) => {
    const channel = Number.parseInt(pair, 16) / 255;
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4;
  }) as [number, number, number];
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

function ratio(front: string, ground: string): number {
  const [a, b] = [luminance(front), luminance(ground)];
  return (Math.max(a, b) + 0.05) / (Math.min(a, b) + 0.05);
}

/** Front, ground, floor, and the ratios in paper and night as the look's own contrast table states them. */
const table: [ColorRole, ColorRole, number, number, number][] = [
  ['ink', 'ground', 4.5, 14.77, 16.87],
  ['ink', 'sheet', 4.5, 16.39, 15.31],
  ['ink', 'well', 4.5, 12.77, 12.5],
  ['ink2', 'ground', 4.5, 8.2, 11.45],
  ['ink2', 'sheet', 4.5, 9.1, 10.39],
  ['ink2', 'well', 4.5, 7.09, 8.49],
  ['ink3', 'ground', 4.5, 5.79, 7.46],
  ['ink3', 'sheet', 4.5, 6.42, 6.77],
  ['ink3', 'well', 4.5, 5.0, 5.53],
  ['onInk', 'ink', 4.5, 16.39, 16.87],
  ['onStage', 'charging', 4.5, 6.58, 5.05],
  ['onStage', 'tapering', 4.5, 4.58, 14.11],
  ['onStage', 'resting', 4.5, 11.82, 8.07],
  ['onCheckDue', 'checkDue', 4.5, 8.99, 11.99],
  ['onStage', 'ready', 4.5, 8.26, 8.01],
  ['onStage', 'held', 4.5, 5.36, 8.84],
  ['onStage', 'stopped', 4.5, 9.38, 7.91],
  ['onAlarm', 'alarm', 4.5, 6.12, 7.08],
  ['charging', 'ground', 4.5, 5.59, 5.05],
  ['charging', 'sheet', 4.5, 6.21, 4.58],
  ['tapering', 'ground', 3, 3.89, 14.11],
  ['tapering', 'sheet', 3, 4.32, 12.81],
  ['resting', 'ground', 4.5, 10.04, 8.07],
  ['resting', 'sheet', 4.5, 11.14, 7.32],
  ['ready', 'ground', 4.5, 7.01, 8.01],
  ['ready', 'sheet', 4.5, 7.78, 7.27],
  ['held', 'ground', 4.5, 4.55, 8.84],
  ['stopped', 'ground', 4.5, 7.97, 7.91],
  ['stopped', 'sheet', 4.5, 8.84, 7.18],
  ['alarm', 'ground', 4.5, 5.2, 7.08],
  ['alarm', 'sheet', 4.5, 5.77, 6.42],
  ['ink', 'chargingTint', 4.5, 12.58, 11.93],
  ['ink', 'taperingTint', 4.5, 12.98, 10.84],
  ['ink', 'restingTint', 4.5, 12.38, 11.76],
  ['ink', 'checkDueTint', 4.5, 13.86, 10.32],
  ['ink', 'readyTint', 4.5, 12.88, 11.01],
  ['ink', 'alarmTint', 4.5, 13.55, 12.45],
  ['ink', 'heldTint', 4.5, 12.25, 11.71],
  ['ink2', 'alarmTint', 4.5, 7.53, 8.45],
  ['ink2', 'checkDueTint', 4.5, 7.7, 7.01],
  ['alarm', 'alarmTint', 4.5, 4.77, 5.22],
  ['edge', 'ground', 3, 3.58, 5.38],
  ['edge', 'sheet', 3, 3.98, 4.88],
  ['charging', 'well', 3, 4.84, 3.74],
  ['tapering', 'well', 3, 3.36, 10.46],
  ['resting', 'well', 3, 8.68, 5.98],
  ['ready', 'well', 3, 6.06, 5.93],
  ['alarm', 'well', 3, 4.49, 5.24],
  ['focus', 'ground', 3, 6.53, 11.99],
  ['focus', 'sheet', 3, 7.25, 10.88],
  ['edge', 'alarmTint', 3, 3.29, 3.97],
  ['edge', 'checkDueTint', 3, 3.37, 3.29],
  ['ground', 'ink2', 4.5, 8.2, 11.45],
  ['charging', 'checkDueTint', 3, 5.25, 3.09],
  ['tapering', 'alarmTint', 3, 3.57, 10.42],
  ['tapering', 'checkDueTint', 3, 3.65, 8.63],
  ['resting', 'checkDueTint', 3, 9.42, 4.94],
  ['alarm', 'checkDueTint', 3, 4.88, 4.33],
  ['ink3', 'alarmTint', 4.5, 5.31, 5.51],
];

describe('contrast of every pair in use', () => {
  it('knows the formula: black on white is 21, #777777 on white 4.48', () => {
    // Both values stand in the W3C's understanding documents.
    expect(ratio('#000000', '#FFFFFF')).toBe(21);
    expect(ratio('#777777', '#FFFFFF')).toBeCloseTo(4.48, 2);
  });

  it('lists the 59 pairs of the look with their floors, and no other', () => {
    const listed = contrastPairs.map(([front, ground, floor]) => `${front} on ${ground} ${floor}`);
    expect([...listed].sort()).toEqual(table.map(([front, ground, floor]) => `${front} on ${ground} ${floor}`).sort());
    expect(new Set(listed).size).toBe(59);
  });

  it.each(table)('%s on %s keeps %s: paper %s, night %s', (front, ground, floor, paper, night) => {
    const seen = [palettes.paper, palettes.night].map((colors) => ratio(colors[front], colors[ground]));
    expect(Math.min(...seen)).toBeGreaterThanOrEqual(floor);
    expect(seen.map((value) => value.toFixed(2))).toEqual([paper.toFixed(2), night.toFixed(2)]);
  });
});
