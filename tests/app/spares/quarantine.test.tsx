import { fireEvent, render, screen } from '@testing-library/react';
import { useState } from 'react';
import { describe, expect, it, vi } from 'vitest';
import { noQuarantineDraft, QuarantineSheet, type QuarantineInput } from '@/shared/ui/spare/quarantine-sheet';

function Sheet({ onConfirm }: { onConfirm: (input: QuarantineInput) => void }) {
  const [draft, setDraft] = useState(noQuarantineDraft);
  return (
    <QuarantineSheet
      spare={{ label: 'S-0408', shelfPlace: 'D4' }}
      fact="No plan takes it until a foreman releases it."
      draft={draft}
      busy={false}
      problem={null}
      onDraft={setDraft}
      onConfirm={onConfirm}
      onClose={() => {}}
    />
  );
}
const open = () => {
  const onConfirm = vi.fn();
  render(<Sheet onConfirm={onConfirm} />);
  return onConfirm;
};
const press = () => fireEvent.click(screen.getByRole('button', { name: 'Put in quarantine' }));

describe('putting a spare in quarantine', () => {
  it('has nothing preselected, and says why it cannot be confirmed yet', () => {
    const onConfirm = open();
    expect(screen.getAllByRole('radio').filter((radio) => radio.getAttribute('aria-checked') === 'true')).toEqual([]);
    expect(screen.getByText('Choose what was seen first.')).toBeTruthy();
    press();
    expect(onConfirm).not.toHaveBeenCalled();
  });

  it('gives what was seen as reason and condition, and where it goes', () => {
    const onConfirm = open();
    fireEvent.click(screen.getByRole('radio', { name: 'Dented' }));
    fireEvent.change(screen.getByLabelText('Where it goes'), { target: { value: 'Outdoor box, place 2' } });
    press();
    expect(onConfirm).toHaveBeenCalledWith({
      reason: 'Dented',
      condition: 'dented',
      shelfPlace: 'Outdoor box, place 2',
    });
  });

  it('asks for words where it is something else, and leaves the condition as it is', () => {
    const onConfirm = open();
    fireEvent.click(screen.getByRole('radio', { name: 'Something else' }));
    press();
    expect(onConfirm).not.toHaveBeenCalled();
    fireEvent.change(screen.getByLabelText('In a few words'), { target: { value: 'rattles' } });
    press();
    expect(onConfirm).toHaveBeenCalledWith({ reason: 'rattles', condition: null, shelfPlace: 'D4' });
  });
});
