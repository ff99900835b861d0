import { render, screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { PictureTable } from '@/shared/ui/charts/picture-table';

const trace = [
  { s: 0, amps: 20, clipVolts: 3.7, restVolts: 3.6, restLowVolts: 3.595, restHighVolts: 3.605 },
  { s: 3600, amps: 20, clipVolts: 4, restVolts: 3.9, restLowVolts: 3.87, restHighVolts: 3.93 },
];
const at = (s: number) => `${s / 60} min`;
const rowsOf = (name: string) =>
  within(screen.getByRole('table', { name }))
    .getAllByRole('row')
    .slice(1)
    .map((row) =>
      within(row)
        .getAllByRole('cell')
        .map((cell) => cell.textContent),
    );

describe('table twin of the picture', () => {
  it('gives the rest voltage with the band it may be in, and every reading with the odd one told in a word', () => {
    render(
      <PictureTable
        trace={trace}
        at={at}
        readings={[
          { s: 2400, volts: 4.12, amps: 20, odd: true },
          { s: 600, volts: 3.71, amps: null },
        ]}
      />,
    );
    expect(rowsOf('Planned volts and amps')).toEqual([
      ['0 min', '3.700', '3.600', '3.595–3.605', '20.0'],
      ['30 min', '3.850', '3.750', '3.733–3.768', '20.0'],
      ['60 min', '4.000', '3.900', '3.870–3.930', '20.0'],
    ]);
    expect(rowsOf('Readings on the picture')).toEqual([
      ['10 min', '3.710', '–'],
      ['40 min, odd', '4.120', '20.0'],
    ]);
  });

  it('has no column of bands for a trace that tells none, and no second table without readings', () => {
    render(<PictureTable trace={trace.map(({ restLowVolts: _l, restHighVolts: _h, ...point }) => point)} at={at} />);
    expect(rowsOf('Planned volts and amps')[0]).toHaveLength(4);
    expect(screen.queryByRole('table', { name: 'Readings on the picture' })).toBeNull();
  });
});
