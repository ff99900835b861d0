import { fireEvent, render, screen } from '@testing-library/react';
import { useState } from 'react';
import { describe, expect, it, vi } from 'vitest';
import { NMC_MOHTAT_2020 } from '@/calc/parameters/nmc-mohtat-2020';
import { pickTextFile } from '@/shared/ui/workshop/pick-text-file';
import { OwnCurveSheet } from '@/shared/ui/workshop/own-curve-sheet';

vi.mock('@/shared/ui/workshop/pick-text-file', () => ({ canPickFile: true, pickTextFile: vi.fn() }));

const input = {
  chemistry: 'nmc',
  ratedAh: 66,
  chargeLimitVolts: 4.2,
  dischargeLimitVolts: 3,
  floorVolts: 2.5,
  shelfVolts: null,
} as const;
/** Eleven rows of a published curve, P. Mohtat et al. (2020). */
const rows = Array.from({ length: 11 }, (_, at) => {
  const index = Math.round((at / 10) * (NMC_MOHTAT_2020.soc.length - 1));
  return `${NMC_MOHTAT_2020.soc[index]};${NMC_MOHTAT_2020.volts[index]}`;
});

function Sheet({ onSave }: { onSave: (text: string) => void }) {
  const [draft, setDraft] = useState({ text: '', fileName: '' });
  return (
    <OwnCurveSheet
      open
      input={input}
      draft={draft}
      onDraft={setDraft}
      busy={false}
      problem={[]}
      onSave={onSave}
      onClose={() => {}}
    />
  );
}
const paste = (text: string) =>
  fireEvent.change(screen.getByLabelText('Or paste the rows'), { target: { value: text } });
const save = () => screen.getByRole('button', { name: 'Save the curve' });

describe('a workshop’s own curve', () => {
  it('is not saved with a row that was read wrong: the row is named and the text kept', () => {
    const onSave = vi.fn();
    render(<Sheet onSave={onSave} />);
    const wrong = ['soc;volts', ...rows.slice(0, 4), '0,45;4O', ...rows.slice(5)].join('\n');
    paste(wrong);
    expect(screen.getByText('Row 6:', { exact: false }).parentElement?.textContent).toMatch(/'4O' is no voltage/);
    expect(save().getAttribute('aria-disabled')).toBe('true');
    fireEvent.click(save());
    expect(onSave).not.toHaveBeenCalled();
    expect((screen.getByLabelText('Or paste the rows') as HTMLTextAreaElement).value).toBe(wrong);
  });

  it('says what was understood, draws it, and is saved as it stands in the file', () => {
    const onSave = vi.fn();
    render(<Sheet onSave={onSave} />);
    expect(screen.getByText('Nothing to save yet.')).toBeTruthy();
    paste(rows.join('\n'));
    expect(screen.getByText('11 points understood: semicolon, charge as a share.')).toBeTruthy();
    expect(screen.getByText('Rest voltage against charge')).toBeTruthy();
    fireEvent.click(save());
    expect(onSave).toHaveBeenCalledWith(rows.join('\n'));
  });

  it.each([
    ['rows.csv', ' \r\n', 'rows.csv is empty. Choose another file, or paste the rows.'],
    // The first bytes of a picture, read as text.
    [
      'rows.png',
      '\ufffdPNG\r\n\u001a\n\0\0\0',
      'rows.png is no plain text. Save the table as CSV, then choose that file.',
    ],
  ])('says why %s is no table, and keeps the rows that stood there', async (name, text, sentence) => {
    render(<Sheet onSave={() => {}} />);
    paste(rows.join('\n'));
    vi.mocked(pickTextFile).mockResolvedValueOnce({ name, text });
    fireEvent.click(screen.getByRole('button', { name: 'Choose a CSV file' }));
    expect((await screen.findByRole('alert')).textContent).toBe(sentence);
    expect((screen.getByLabelText('Or paste the rows') as HTMLTextAreaElement).value).toBe(rows.join('\n'));
    vi.mocked(pickTextFile).mockResolvedValueOnce({ name: 'good.csv', text: rows.join('\r\n') });
    fireEvent.click(screen.getByRole('button', { name: 'Choose a CSV file' }));
    await screen.findByText('good.csv');
    expect(screen.queryByRole('alert')).toBeNull();
  });
});
