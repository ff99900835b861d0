import { act, fireEvent, render, screen } from '@testing-library/react';
import { useState } from 'react';
import { describe, expect, it } from 'vitest';
import { Button } from '@/shared/ui/primitives/button';
import { Field } from '@/shared/ui/primitives/field';
import { Select } from '@/shared/ui/primitives/select';
import { TimeField } from '@/shared/ui/primitives/time-field';
import { DayField } from '@/shared/ui/workshop/day-field';
import { pressFrom } from '../../support/press';

/** Every control that reports its leaving, over a button; the order in which things happened. */
function show() {
  const said: string[] = [];
  function Controls() {
    const [gone, setGone] = useState(false);
    const [time, setTime] = useState('1815');
    const left = (name: string) => () => said.push(`left ${name}`);
    return (
      <>
        <Field label="Volts" value="39" onChangeText={() => {}} onBlur={left('Volts')} />
        <Select
          label="Meter"
          value="m1"
          options={[{ value: 'm1', label: 'M-3' }]}
          onChange={() => {}}
          onBlur={left('Meter')}
        />
        <DayField label="Checked" value="" onChange={() => {}} onBlur={left('Checked')} />
        <TimeField label="Ready by" value={time} onChangeText={setTime} onBlur={left('Ready by')} />
        {gone ? null : <Field label="Note" value="" onChangeText={() => {}} onBlur={left('Note')} />}
        <Button title="Save" onPress={() => said.push('pressed')} />
        <Button title="Take the note away" onPress={() => setGone(true)} />
        <Button title="Empty the time" onPress={() => setTime('')} />
      </>
    );
  }
  render(<Controls />);
  return said;
}
const control = (label: string) => screen.getByLabelText<HTMLInputElement>(label);
const button = (name: string) => () => screen.getByRole('button', { name });
const soon = () => act(() => new Promise<void>((resolve) => setTimeout(resolve, 5)));

describe('leaving a control', () => {
  it.each(['Volts', 'Meter', 'Checked', 'Ready by'])('%s by the keyboard counts at once', (label) => {
    const said = show();
    act(() => control(label).focus());
    act(() => control(label).blur());
    expect(said).toEqual([`left ${label}`]);
  });

  it.each(['Volts', 'Meter', 'Checked', 'Ready by'] as const)(
    '%s by a press counts once, after the click, with mouse and with touch',
    async (label) => {
      const said = show();
      await pressFrom(control(label), button('Save'), 'mouse');
      expect(said).toEqual(['pressed', `left ${label}`]);
      await pressFrom(control(label), button('Save'), 'touch');
      expect(said).toEqual(['pressed', `left ${label}`, 'pressed', `left ${label}`]);
    },
  );

  it('counts after a press that is called off, as by scrolling', async () => {
    const said = show();
    act(() => control('Volts').focus());
    fireEvent.pointerDown(document.body, { buttons: 1 });
    act(() => control('Volts').blur());
    await soon();
    expect(said).toEqual([]);
    fireEvent.pointerCancel(document.body);
    await soon();
    expect(said).toEqual(['left Volts']);
  });

  it('counts with the next movement or key where the end of a press went to a native list', async () => {
    const said = show();
    act(() => control('Volts').focus());
    fireEvent.pointerDown(control('Meter'), { buttons: 1 });
    act(() => control('Volts').blur());
    fireEvent.pointerMove(document.body, { buttons: 1 });
    await soon();
    expect(said).toEqual([]);
    fireEvent.pointerMove(document.body, { buttons: 0 });
    await soon();
    expect(said).toEqual(['left Volts']);

    act(() => control('Volts').focus());
    fireEvent.pointerDown(control('Meter'), { buttons: 1 });
    act(() => control('Volts').blur());
    fireEvent.keyDown(control('Meter'), { key: 'Tab' });
    await soon();
    expect(said).toEqual(['left Volts', 'left Volts']);
  });

  it('is not told of a field that the press took away', async () => {
    const said = show();
    await pressFrom(control('Note'), button('Take the note away'));
    expect(said).toEqual([]);
  });

  it('writes a time out after the press, unless the press emptied it', async () => {
    show();
    await pressFrom(control('Ready by'), button('Save'));
    expect(control('Ready by').value).toBe('18:15');
    await pressFrom(control('Ready by'), button('Empty the time'));
    expect(control('Ready by').value).toBe('');
  });
});
