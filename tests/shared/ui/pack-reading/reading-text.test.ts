import fc from 'fast-check';
import Papa from 'papaparse';
import { describe, expect, it } from 'vitest';
import { readReadingText } from '@/shared/ui/pack-reading/reading-text';

const read = (text: string, groupCount: number) => readReadingText(text, { groupCount });

interface Table {
  millivolts: number[];
  unit: 'V' | 'mV';
  delimiter: ',' | ';' | '\t';
  decimal: '.' | ',';
  header: boolean;
  numbered: boolean;
  others: boolean;
  inColumns: boolean;
  bom: boolean;
  newline: '\n' | '\r\n' | '\r';
  quotes: boolean;
}
const tablesFrom = (least: number) =>
  fc.record<Table>({
    millivolts: fc.array(fc.integer({ min: 3000, max: 4250 }), { minLength: least, maxLength: 400, size: 'max' }),
    unit: fc.constantFrom('V', 'mV'),
    delimiter: fc.constantFrom(',', ';', '\t'),
    decimal: fc.constantFrom('.', ','),
    header: fc.boolean(),
    numbered: fc.boolean(),
    others: fc.boolean(),
    inColumns: fc.boolean(),
    bom: fc.boolean(),
    newline: fc.constantFrom('\n', '\r\n', '\r'),
    quotes: fc.boolean(),
  });

const fewGroups = tablesFrom(1).map((table) => ({ ...table, millivolts: table.millivolts.slice(0, 4) }));

/** The table as a spreadsheet writes it. */
function written(table: Table): string {
  const shown = (text: string) => text.replace('.', table.decimal);
  const rows = table.millivolts.map((mv, group) => [
    ...(table.numbered ? [String(group + 1)] : []),
    shown(table.unit === 'mV' ? String(mv) : (mv / 1000).toFixed(3)),
    // Degrees beside each group: another column, no voltage in either unit.
    ...(table.others ? [shown(`2${group % 10}.5`)] : []),
  ]);
  const head = [
    ...(table.numbered ? ['Group'] : []),
    `Voltage ${table.unit}`,
    ...(table.others ? ['Temperature'] : []),
  ];
  const all = table.header ? [head, ...rows] : rows;
  const turned = all[0]!.map((_, column) => all.map((row) => row[column]!));
  const text = Papa.unparse(table.inColumns ? turned : all, {
    delimiter: table.delimiter,
    newline: table.newline,
    quotes: table.quotes,
  });
  return (table.bom ? '\ufeff' : '') + text;
}

describe('a table of group voltages', () => {
  it('written out in 600 combinations of separator, decimal mark, unit, header, direction and quotes reads back to the last digit', () => {
    fc.assert(
      fc.property(fc.oneof(tablesFrom(1), fewGroups), (table) => {
        const got = read(written(table), table.millivolts.length);
        expect(got.refusal).toBeNull();
        expect(got.groupVolts).toEqual(table.millivolts.map((mv) => Number((mv / 1000).toFixed(3))));
        expect(got.unit).toBe(table.unit);
        if (table.unit === 'V') expect(got.decimal).toBe(table.decimal === ',' ? 'comma' : 'point');
      }),
      { numRuns: 600, seed: 20260609, endOnFailure: true },
    );
  });

  it('says separator, direction, header and the columns it left out, of a table of 40 groups and more', () => {
    fc.assert(
      fc.property(tablesFrom(40), (table) => {
        const got = read(written(table), table.millivolts.length);
        expect(got.orientation).toBe(table.inColumns ? 'columns' : 'rows');
        const cells = (table.numbered ? 1 : 0) + (table.others ? 1 : 0) + 1;
        if (!table.quotes && (table.inColumns || cells > 1))
          expect(got.separator).toBe(table.delimiter === ',' ? 'comma' : table.delimiter === ';' ? 'semicolon' : 'tab');
        if (!table.inColumns) {
          expect(got.headerLines).toBe(table.header ? 1 : 0);
          expect(got.ignored).toEqual(table.others ? [table.header ? 'Temperature' : `column ${cells}`] : []);
        }
      }),
      { numRuns: 120, seed: 4, endOnFailure: true },
    );
  });

  it('keeps fractions of a millivolt and a fourth decimal', () => {
    expect(read('mV\n3949.125\n3951.5', 2).groupVolts).toEqual([3.949125, 3.9515]);
    expect(read('3,9491\n3,9512\n3,9503', 3).groupVolts).toEqual([3.9491, 3.9512, 3.9503]);
  });

  it('takes units in the cells, names of groups and a dead group of 0 V', () => {
    const got = read('Cell 1;3.949 V\nCell 2;0.000 V\nCell 3;3.951 V', 3);
    expect(got).toMatchObject({ groupVolts: [3.949, 0, 3.951], refusal: null, ignored: [] });
  });

  it('puts the groups in the order of their numbers where the column says it is their number', () => {
    expect(read('group;mV\n3;3953\n1;3951\n2;3952', 3).groupVolts).toEqual([3.951, 3.952, 3.953]);
  });

  it('knows the voltage column by its heading where two could be it', () => {
    const got = read('temp;volts\n3.1;3.949\n3.2;3.951\n3.1;3.950', 3);
    expect(got).toMatchObject({ groupVolts: [3.949, 3.951, 3.95], ignored: ['temp'] });
  });

  it('names lines before and after the numbered groups that hold none', () => {
    const got = read('Pack voltage;379.2\ngroup;mV\n1;3949\n2;3951\n3;3950\naverage;3950', 3);
    expect(got).toMatchObject({ groupVolts: [3.949, 3.951, 3.95], headerLines: 2, ignored: ['line 6, “average”'] });
  });

  it('understands a first line that says the separator, and counts it', () => {
    expect(read('sep=;\n1;3949\n2;3951', 2)).toMatchObject({ separator: 'semicolon', headerLines: 1, refusal: null });
  });

  it('shows the first 5 lines with the group each was read as', () => {
    const { lines } = read('group;mV\n1;3949\n2;3953\n3;3951\n4;3952\n5;3950', 5);
    expect(lines.map(({ line, text, header, groups }) => [line, text, header, groups])).toEqual([
      [1, 'group;mV', true, null],
      [2, '1;3949', false, [0]],
      [3, '2;3953', false, [1]],
      [4, '3;3951', false, [2]],
      [5, '4;3952', false, [3]],
    ]);
  });

  it('takes a pasted row with spaces between the voltages', () => {
    expect(read('3.949 3.951  3.950', 3)).toMatchObject({ groupVolts: [3.949, 3.951, 3.95], separator: 'space' });
  });
});

describe('what cannot be read', () => {
  it('is refused with both numbers where the groups are too few', () => {
    expect(read('3949\n3951\n3950', 96).refusal).toBe(
      '3 groups were understood; this pack has 96. Choose the table of this pack, or correct the pack.',
    );
  });

  it('is named by its line, and the groups after it keep their numbers', () => {
    const got = read('group;mV\n1;3949\n2;n/a\n3;39510\n4;3950\n5;3951', 5);
    expect(got.problems).toEqual([
      { line: 3, text: '“n/a” is no voltage.' },
      { line: 4, text: '39510 mV is over 5000 mV.' },
    ]);
    expect(got.refusal).toBe('3 groups were understood; this pack has 5. Lines 3 and 4 were not understood.');
  });

  it.each(['=1+1', '+SUM(A1)', '-cmd', '@here'])(
    'names %s as a formula by its line, in whatever column it stands',
    (cell) => {
      const got = read(`group;mV;note\n1;3949;\n2;3951;${cell}\n3;3950;`, 3);
      expect(got.refusal).toBe('Line 3 holds a formula, no voltage. Save the table with its values only.');
      expect(got.problems).toEqual([{ line: 3, text: `“${cell}” is a formula.` }]);
    },
  );

  it('is refused where the comma separates and is the decimal mark too', () => {
    const rows = Array.from({ length: 12 }, (_, at) => `${at + 1},3,9${50 + at}`).join('\n');
    expect(read(rows, 12).refusal).toMatch(/^The comma separates the columns and is the decimal mark too/);
    expect(read('3,949,3,951,3,950,3,952', 4).refusal).toMatch(/^The comma separates/);
  });

  it.each(['Dear workshop,\nthe pack is ready.\n', '{"a": "b"}', '<html><body>no</body></html>'])(
    'is refused as no table: %j',
    (text) => expect(read(text, 96).refusal).toMatch(/^No table of group voltages/),
  );

  it('is refused from the line on where a quotation mark stands open', () => {
    expect(read('group;mV\n1;3949\n2;"3951\n3;3950', 3).refusal).toMatch(
      /^From line \d on a quotation mark stands open/,
    );
  });

  it('is refused line by line where a person says volts of millivolts', () => {
    const got = readReadingText('3949\n3951', { groupCount: 2, unit: 'V' });
    expect(got.groupVolts).toEqual([]);
    expect(got.refusal).not.toBeNull();
    expect(got.problems).toHaveLength(2);
  });
});
