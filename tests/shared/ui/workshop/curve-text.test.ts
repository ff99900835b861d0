import { describe, expect, it } from 'vitest';
import { NMC_MOHTAT_2020 } from '@/calc/parameters/nmc-mohtat-2020';
import { readCurveText, separatorOf, understoodWords } from '@/shared/ui/workshop/curve-text';

/** Eleven rows of the published NMC curve, P. Mohtat et al. (2020), written as people write them. */
const points = Array.from({ length: 11 }, (_, at) => {
  const index = Math.round((at / 10) * (NMC_MOHTAT_2020.soc.length - 1));
  return [NMC_MOHTAT_2020.soc[index]!, NMC_MOHTAT_2020.volts[index]!] as const;
});
const comma = (value: number, digits: number) => value.toFixed(digits).replace('.', ',');

describe('a curve that is pasted or comes out of a file', () => {
  it('is the same points from semicolons with decimal commas and per cent, from tabs, and from commas with points', () => {
    const written = {
      semicolon: ['Ladung;Spannung', ...points.map(([soc, volts]) => `${comma(soc * 100, 2)} %;${comma(volts, 4)}`)],
      tab: points.map(([soc, volts]) => `${soc.toFixed(4)}\t${volts.toFixed(4)}`),
      comma: points.map(([soc, volts]) => `${soc.toFixed(4)},${volts.toFixed(4)}`),
    };
    for (const [separator, rows] of Object.entries(written)) {
      const read = readCurveText(rows.join('\r\n'), 'nmc')!;
      expect(read.separator).toBe(separator);
      if (!read.own.ok) throw new Error(read.own.problems[0]?.text);
      read.own.curve.soc.forEach((soc, at) => expect(soc).toBeCloseTo(points[at]![0], 3));
      read.own.curve.volts.forEach((volts, at) => expect(volts).toBeCloseTo(points[at]![1], 3));
    }
  });

  it('says in a sentence what was understood, with the heading that was skipped', () => {
    const text = ['soc;volts', ...points.map(([soc, volts]) => `${soc * 100};${volts}`)].join('\n');
    const read = readCurveText(text, 'nmc')!;
    expect(understoodWords(read)).toBe(
      '11 points understood: semicolon, charge in per cent, one heading line skipped.',
    );
    expect(read.lines).toHaveLength(4);
    expect(read.lines[0]).toEqual({ text: 'soc;volts', soc: null, volts: null });
  });

  it('names the row that was read wrong, counted as in the file', () => {
    const rows = points.map(([soc, volts]) => `${soc};${volts}`);
    rows[4] = `${points[4]![0]};3,x`;
    const read = readCurveText(['soc;volts', ...rows].join('\n'), 'nmc')!;
    expect(read.own.ok).toBe(false);
    expect(!read.own.ok && read.own.problems[0]).toEqual({
      row: 6,
      text: "'3,x' is no voltage. Give a number, 3.652 for example.",
    });
  });

  it('does not take decimal commas between commas for four columns of numbers', () => {
    const text = points.map(([soc, volts]) => `${comma(soc, 3)},${comma(volts, 3)}`).join('\n');
    const read = readCurveText(text, 'nmc')!;
    expect(!read.own.ok && read.own.problems.map((problem) => problem.text)).toEqual([
      'The comma separates the columns and is the decimal mark too. Separate the columns by semicolons.',
    ]);
  });

  it('reads nothing from nothing', () => {
    expect(readCurveText(' \n ', 'nmc')).toBeNull();
    expect(separatorOf('1,2')).toBe('comma');
  });
});
