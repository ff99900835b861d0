import { act, fireEvent, render, screen } from '@testing-library/react';
import { createRef, useState } from 'react';
import { Controller, useForm } from 'react-hook-form';
import { describe, expect, it, vi } from 'vitest';
import { Button } from '@/shared/ui/primitives/button';
import { Field, type FieldHandle } from '@/shared/ui/primitives/field';
import { noteFits } from '@/shared/ui/primitives/field-frame';
import { Select } from '@/shared/ui/primitives/select';
import { TimeField } from '@/shared/ui/primitives/time-field';

const described = (element: HTMLElement) =>
  (element.getAttribute('aria-describedby') ?? '')
    .split(' ')
    .filter(Boolean)
    .map((id) => document.getElementById(id)?.textContent);

function Held({ first = '', ...props }: { first?: string } & Partial<React.ComponentProps<typeof Field>>) {
  const [value, setValue] = useState(first);
  return <Field label="Group 2" {...props} value={value} onChangeText={setValue} />;
}

describe('Field', () => {
  it('is named by its label and keeps a value exactly as typed', () => {
    render(<Held kind="decimal" unit="V" />);
    const input = screen.getByRole('textbox', { name: 'Group 2' });
    fireEvent.change(input, { target: { value: '3,957 V ' } });
    fireEvent.blur(input);
    expect(input).toHaveProperty('value', '3,957 V ');
  });

  it('brings the decimal keys for decimals, number keys for whole numbers, and no corrections for either', () => {
    render(<Held label="Volts" kind="decimal" />);
    render(<Held label="Minutes" kind="whole" />);
    expect(screen.getByRole('textbox', { name: 'Volts' }).getAttribute('inputmode')).toBe('decimal');
    expect(screen.getByRole('textbox', { name: 'Minutes' }).getAttribute('inputmode')).toBe('numeric');
    expect(screen.getByRole('textbox', { name: 'Volts' }).getAttribute('autocorrect')).toBe('off');
    expect(screen.getByRole('textbox', { name: 'Volts' }).getAttribute('autocapitalize')).toBe('none');
  });

  it('moves the keyboard into the box when its label is pressed', () => {
    render(<Held />);
    fireEvent.click(screen.getByText('Group 2'));
    expect(document.activeElement).toBe(screen.getByRole('textbox', { name: 'Group 2' }));
  });

  it('reads an error with the box and says it is invalid; a hint is read too', () => {
    render(<Held error="Two decimals are not enough to judge 5 mV. Type three." hint="At rest, at the tabs" />);
    const input = screen.getByRole('textbox', { name: 'Group 2' });
    expect(described(input)).toEqual([
      'Two decimals are not enough to judge 5 mV. Type three.',
      'At rest, at the tabs',
    ]);
    expect(input.getAttribute('aria-invalid')).toBe('true');
  });

  it('reads a verdict with the box without calling it invalid: it was typed right', () => {
    render(<Held verdict={{ inside: false, text: '7 mV below, outside' }} />);
    const input = screen.getByRole('textbox', { name: 'Group 2' });
    expect(described(input)).toEqual(['7 mV below, outside']);
    expect(input.getAttribute('aria-invalid')).toBeNull();
  });

  it('keeps a short note beside the label and sends a long one under the box', () => {
    expect(noteFits('Group 2', '7 mV below, outside', 358)).toBe(true);
    expect(noteFits('Charge to', "39.68 V is over this type's 4.20 V. A point in the wrong place?", 358)).toBe(false);
  });

  it('takes no typing when it is read-only and keeps its value selectable', () => {
    render(<Held first="3.968" readOnly />);
    const input = screen.getByRole<HTMLInputElement>('textbox', { name: 'Group 2' });
    expect([input.readOnly, input.disabled, input.value]).toEqual([true, false, '3.968']);
  });

  it('calls on Enter what the next key is for', () => {
    const next = vi.fn();
    render(<Held onSubmit={next} nextKey="next" />);
    fireEvent.keyDown(screen.getByRole('textbox'), { key: 'Enter' });
    expect(next).toHaveBeenCalledTimes(1);
  });

  it('hands focus, blur and select to its ref', () => {
    const ref = createRef<FieldHandle>();
    render(<Held first="3.9" ref={ref} />);
    const input = screen.getByRole<HTMLInputElement>('textbox');
    act(() => ref.current?.select());
    expect(document.activeElement).toBe(input);
    expect([input.selectionStart, input.selectionEnd]).toEqual([0, 3]);
    act(() => ref.current?.blur());
    expect(document.activeElement).toBe(document.body);
  });
});

describe('Field in a form', () => {
  function Form({ onSave }: { onSave: (values: { volts: string }) => void }) {
    const { control, handleSubmit } = useForm({ defaultValues: { volts: '' }, mode: 'onBlur' });
    return (
      <>
        <Controller
          control={control}
          name="volts"
          rules={{ required: 'Type the voltage of group 2.' }}
          render={({ field, fieldState }) => (
            <Field
              label="Group 2"
              kind="decimal"
              value={field.value}
              onChangeText={field.onChange}
              onBlur={field.onBlur}
              ref={field.ref}
              error={fieldState.error?.message}
            />
          )}
        />
        <Button title="Save the reading" onPress={() => void handleSubmit(onSave)()} />
      </>
    );
  }

  it('goes to the first error on sending, shows its sentence, and sends what was typed once it is right', async () => {
    const save = vi.fn();
    render(<Form onSave={save} />);
    await act(async () => fireEvent.click(screen.getByRole('button', { name: 'Save the reading' })));
    const input = screen.getByRole('textbox', { name: 'Group 2' });
    expect(document.activeElement).toBe(input);
    expect(described(input)).toEqual(['Type the voltage of group 2.']);
    expect(save).not.toHaveBeenCalled();
    fireEvent.change(input, { target: { value: '3,957' } });
    await act(async () => fireEvent.click(screen.getByRole('button', { name: 'Save the reading' })));
    expect(save.mock.calls[0]?.[0]).toEqual({ volts: '3,957' });
  });
});

describe('Select', () => {
  it('shows its empty word until something is chosen, then tells the choice', () => {
    const choose = vi.fn();
    const options = [
      { value: 'a1', label: 'A1, 10 A' },
      { value: 'b1', label: 'B1, 20 A' },
    ];
    render(<Select label="Channel" value={null} options={options} onChange={choose} empty="Choose a channel" />);
    const list = screen.getByRole<HTMLSelectElement>('combobox', { name: 'Channel' });
    expect(list.selectedOptions[0]?.textContent).toBe('Choose a channel');
    fireEvent.change(list, { target: { value: 'b1' } });
    expect(choose).toHaveBeenCalledExactlyOnceWith('b1');
  });
});

describe('TimeField', () => {
  function Clock({ first }: { first: string }) {
    const [value, setValue] = useState(first);
    return <TimeField label="Ready by" value={value} onChangeText={setValue} />;
  }

  it('leaves 1815 as typed until the field is left, then writes 18:15; what is no time stays', () => {
    render(<Clock first="" />);
    const input = screen.getByRole<HTMLInputElement>('textbox', { name: 'Ready by' });
    fireEvent.change(input, { target: { value: '1815' } });
    expect(input.value).toBe('1815');
    fireEvent.blur(input);
    expect(input.value).toBe('18:15');
    fireEvent.change(input, { target: { value: 'noon' } });
    fireEvent.blur(input);
    expect(input.value).toBe('noon');
  });

  it('takes a quarter hour from the list', () => {
    render(<Clock first="18:07" />);
    const list = screen.getByRole<HTMLSelectElement>('combobox', { name: 'Ready by, pick in quarter hours' });
    expect(list.value).toBe('18:00');
    fireEvent.change(list, { target: { value: '18:45' } });
    expect(screen.getByRole('textbox', { name: 'Ready by' })).toHaveProperty('value', '18:45');
  });
});
