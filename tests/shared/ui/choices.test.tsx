import { fireEvent, render, screen } from '@testing-library/react';
import { useState } from 'react';
import { describe, expect, it, vi } from 'vitest';
import { Button } from '@/shared/ui/primitives/button';
import { CheckBox } from '@/shared/ui/primitives/check-box';
import { ChoiceList } from '@/shared/ui/primitives/choice-row';
import { SegmentSwitch } from '@/shared/ui/primitives/segment-switch';

describe('CheckBox', () => {
  function Held() {
    const [checked, setChecked] = useState(false);
    return <CheckBox checked={checked} onChange={setChecked} title="We have trained people" />;
  }

  it('turns by a press anywhere in its line, and by the space key', () => {
    render(<Held />);
    const box = screen.getByRole('checkbox', { name: 'We have trained people' });
    expect(box.getAttribute('aria-checked')).toBe('false');
    fireEvent.click(screen.getByText('We have trained people'));
    expect(box.getAttribute('aria-checked')).toBe('true');
    fireEvent.keyDown(box, { key: ' ' });
    fireEvent.keyUp(box, { key: ' ' });
    expect(box.getAttribute('aria-checked')).toBe('false');
  });

  it('reads its error with its name and says it is invalid', () => {
    render(<CheckBox checked={false} onChange={() => {}} title="We have trained people" error="Tick it to go on." />);
    const box = screen.getByRole('checkbox', { name: 'We have trained people. Tick it to go on.' });
    expect(box.getAttribute('aria-invalid')).toBe('true');
  });

  it('does nothing when disabled, and can still be reached and read', () => {
    const change = vi.fn();
    render(<CheckBox checked onChange={change} title="Locked" disabled />);
    const box = screen.getByRole('checkbox', { name: 'Locked' });
    fireEvent.click(box);
    expect(change).not.toHaveBeenCalled();
    expect(box.getAttribute('aria-disabled')).toBe('true');
  });
});

describe('SegmentSwitch', () => {
  const segments = [
    { value: 'all', label: 'All', count: 27 },
    { value: 'shelf', label: 'Shelf', count: 19 },
    { value: 'charge', label: 'On a charge', count: 6 },
  ] as const;
  function Held({ onChange }: { onChange?: (value: string) => void }) {
    const [value, setValue] = useState<'all' | 'shelf' | 'charge'>('all');
    return (
      <SegmentSwitch
        label="Which spares"
        value={value}
        segments={segments}
        onChange={(next) => {
          setValue(next);
          onChange?.(next);
        }}
      />
    );
  }
  const checked = () => screen.getAllByRole('radio').map((radio) => radio.getAttribute('aria-checked'));

  it('is a named group with one chosen word, its count read with it', () => {
    render(<Held />);
    expect(screen.getByRole('radiogroup', { name: 'Which spares' })).toBeTruthy();
    expect(screen.getByRole('radio', { name: 'All 27' })).toBeTruthy();
    expect(checked()).toEqual(['true', 'false', 'false']);
  });

  it('is one stop for the Tab key, at the chosen word', () => {
    render(<Held />);
    expect(screen.getAllByRole('radio').map((radio) => radio.tabIndex)).toEqual([0, -1, -1]);
  });

  it('walks with the arrow keys, round at the ends, and takes the focus along', () => {
    render(<Held />);
    const [first, second, third] = screen.getAllByRole('radio');
    fireEvent.keyDown(first!, { key: 'ArrowRight' });
    expect(checked()).toEqual(['false', 'true', 'false']);
    expect(document.activeElement).toBe(second);
    fireEvent.keyDown(second!, { key: 'End' });
    expect(document.activeElement).toBe(third);
    fireEvent.keyDown(third!, { key: 'ArrowRight' });
    expect(checked()).toEqual(['true', 'false', 'false']);
    fireEvent.keyDown(first!, { key: 'ArrowLeft' });
    expect(checked()).toEqual(['false', 'false', 'true']);
  });

  it('tells a press once, and other keys nothing', () => {
    const change = vi.fn();
    render(<Held onChange={change} />);
    fireEvent.click(screen.getByRole('radio', { name: 'Shelf 19' }));
    fireEvent.keyDown(screen.getByRole('radio', { name: 'Shelf 19' }), { key: 'a' });
    expect(change).toHaveBeenCalledExactlyOnceWith('shelf');
  });
});

describe('ChoiceList', () => {
  const choices = [
    { value: 'warm', title: 'Warm, smells, or swollen' },
    { value: 'odd', title: 'Odd reading, not explained', disabled: true },
    { value: 'else', title: 'Something else' },
  ];
  it('preselects nothing, lets Tab in at the first row, and steps over what is disabled without choosing it', () => {
    const change = vi.fn();
    render(<ChoiceList label="Why" value={null} choices={choices} onChange={change} />);
    const rows = screen.getAllByRole('radio');
    expect(rows.map((row) => row.getAttribute('aria-checked'))).toEqual(['false', 'false', 'false']);
    expect(rows.map((row) => row.tabIndex)).toEqual([0, -1, -1]);
    fireEvent.keyDown(rows[0]!, { key: 'ArrowDown' });
    expect(change).not.toHaveBeenCalled();
    expect(document.activeElement).toBe(rows[1]);
    fireEvent.click(rows[1]!);
    expect(change).not.toHaveBeenCalled();
    fireEvent.keyDown(rows[1]!, { key: ' ' });
    expect(change).not.toHaveBeenCalled();
    fireEvent.keyDown(rows[1]!, { key: 'ArrowDown' });
    expect(change).toHaveBeenCalledExactlyOnceWith('else');
    fireEvent.keyDown(rows[0]!, { key: ' ' });
    expect(change).toHaveBeenLastCalledWith('warm');
  });
});

describe('Button', () => {
  it('stays reachable when disabled, carries its reason, and does nothing', () => {
    const press = vi.fn();
    render(
      <>
        <span id="why">3 answers still to come.</span>
        <Button title="Clip on and start the timer" disabled describedBy="why" onPress={press} />
      </>,
    );
    const button = screen.getByRole('button', { name: 'Clip on and start the timer' });
    fireEvent.click(button);
    expect(press).not.toHaveBeenCalled();
    expect([button.getAttribute('aria-disabled'), button.getAttribute('aria-describedby')]).toEqual(['true', 'why']);
    expect(button.tabIndex).toBe(0);
  });

  it('takes no second press while it is busy, and keeps its word', () => {
    const press = vi.fn();
    render(<Button title="Save the reading" busy onPress={press} />);
    const button = screen.getByRole('button', { name: 'Save the reading' });
    fireEvent.click(button);
    expect(press).not.toHaveBeenCalled();
    expect(button.getAttribute('aria-busy')).toBe('true');
  });
});
