import { fireEvent, render, screen, waitFor, within } from '@testing-library/react';
import { useState } from 'react';
import { describe, expect, it, vi } from 'vitest';
import type { SpareDto } from '@/shared/contract/spare';
import { FormatsProvider } from '@/shared/ui/format/formats';
import { SpareChoice } from '@/shared/ui/plan/spare-choice';
import { spareOf } from './spare-of';

const spare = (number: number, more: Partial<SpareDto> = {}): SpareDto =>
  spareOf({
    id: `s${number}`,
    label: `S-04${String(number).padStart(2, '0')}`,
    shelfPlace: `D${number}`,
    ...more,
  });
const eight = Array.from({ length: 8 }, (_, index) => spare(index + 1));
const nine = [...eight, spare(9, { typeName: '3-series 78 Ah', shelfPlace: 'rack 2' })];

const chose = vi.fn();
const left = vi.fn();
function Choice({ spares }: { spares: SpareDto[] }) {
  const [spareId, setSpareId] = useState('');
  const change = (id: string) => {
    chose(id);
    setSpareId(id);
  };
  return <SpareChoice spares={spares} spareId={spareId} onChange={change} onLeave={left} />;
}
const draw = (spares: SpareDto[]) => {
  chose.mockClear();
  left.mockClear();
  return render(
    <FormatsProvider languageTag="en-GB" zone="UTC">
      <Choice spares={spares} />
    </FormatsProvider>,
  );
};
async function openSheet() {
  fireEvent.click(screen.getByRole('button', { name: 'Spare: Choose a spare' }));
  const sheet = within(await screen.findByRole('dialog'));
  return { sheet, box: sheet.getByLabelText('Label, type or shelf') };
}

describe('the spare of a plan', () => {
  it('out of 8 is chosen from the native list', () => {
    draw(eight);
    fireEvent.change(screen.getByLabelText('Spare'), { target: { value: 's3' } });
    expect(chose).toHaveBeenCalledWith('s3');
  });

  it.each([
    ['0409', 's9'],
    ['3-series', 's9'],
    ['RACK', 's9'],
    ['66 d5', 's5'],
  ])('out of 9 is found by %j in label, type and shelf, and chosen by a tap', async (typed, id) => {
    draw(nine);
    const { sheet, box } = await openSheet();
    expect(sheet.getAllByLabelText(/^S-04/)).toHaveLength(9);
    fireEvent.change(box, { target: { value: typed } });
    const rows = sheet.getAllByLabelText(/^S-04/);
    expect(rows).toHaveLength(1);
    fireEvent.click(rows[0]!);
    expect(chose.mock.calls).toEqual([[id]]);
    expect(left).toHaveBeenCalledTimes(1);
    await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull());
    expect(screen.getByRole('button', { name: new RegExp(`^Spare: S-040${id.slice(1)}`) })).toBeTruthy();
  });

  it('is reached by keys alone: Down walks from the line into the rows, Enter takes the only one found and no other', async () => {
    draw(nine);
    const { sheet, box } = await openSheet();
    fireEvent.keyDown(box, { key: 'ArrowDown' });
    const rows = sheet.getAllByLabelText(/^S-04/);
    expect(document.activeElement).toBe(rows[0]);
    fireEvent.keyDown(rows[0]!, { key: 'ArrowDown' });
    expect(document.activeElement).toBe(rows[1]);
    fireEvent.change(box, { target: { value: '66' } });
    fireEvent.keyDown(box, { key: 'Enter' });
    expect(chose).not.toHaveBeenCalled();
    fireEvent.change(box, { target: { value: '0407' } });
    fireEvent.keyDown(box, { key: 'Enter' });
    expect(chose.mock.calls).toEqual([['s7']]);
  });

  it('that nothing matches is said with what was typed', async () => {
    draw(nine);
    const { sheet, box } = await openSheet();
    fireEvent.change(box, { target: { value: 'S-9999' } });
    expect(sheet.getByText('No spare matches “S-9999”.')).toBeTruthy();
  });
});
