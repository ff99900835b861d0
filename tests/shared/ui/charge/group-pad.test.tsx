import { fireEvent, render, screen } from '@testing-library/react';
import { useEffect, type ReactNode } from 'react';
import { useForm } from 'react-hook-form';
import { describe, expect, it } from 'vitest';
import { FormatsProvider } from '@/shared/ui/format/formats';
import { GroupFields, type GroupEntryProps } from '@/shared/ui/group-volts/group-fields';
import { groupList, pastedVolts, type GroupForm } from '@/shared/ui/group-volts/group-form';
import { GroupPad } from '@/shared/ui/group-volts/group-pad';

const held: { form: GroupForm | null } = { form: null };
function Pad({
  count = 8,
  language = 'en-GB',
  entry: Entry = GroupPad,
}: {
  count?: number;
  language?: string;
  entry?: (props: GroupEntryProps) => ReactNode;
}) {
  const own = useForm({ defaultValues: { groupVolts: Array.from({ length: count }, () => '') } });
  useEffect(() => {
    held.form = own;
  }, [own]);
  return (
    <FormatsProvider languageTag={language} zone="UTC">
      <Entry form={own} count={count} />
    </FormatsProvider>
  );
}
const Fields = ({ count }: { count: number }) => (
  <Pad count={count} entry={(entry) => <GroupFields {...entry} columns={2} />} />
);
const paste = (field: HTMLElement, text: string) => fireEvent.paste(field, { clipboardData: { getData: () => text } });
const values = () => held.form!.getValues('groupVolts');
const press = (name: string) => fireEvent.click(screen.getByRole('button', { name }));
const type = (keys: string) => [...keys].forEach((key) => press(key === '.' ? 'Decimal mark' : key));

describe('the group pad', () => {
  it('types a voltage by its own keys, with one decimal mark however often it is pressed, and rubs out the last key', () => {
    render(<Pad />);
    type('3.8.99');
    press('Rub out');
    press('6');
    expect(values()[0]).toBe('3.896');
  });

  it('writes the decimal mark of the place', () => {
    render(<Pad language="de-DE" />);
    type('3.896');
    expect(values()[0]).toBe('3,896');
  });

  it('walks from group to group; a skipped one stays open and can be gone back to', () => {
    render(<Pad />);
    type('3.896');
    press('On to G2');
    press('Skip G2');
    type('3.890');
    expect(values().slice(0, 3)).toEqual(['3.896', '', '3.890']);
    press('Back to G2');
    expect(screen.getByRole('textbox', { name: 'Group 2, volts' })).toBeTruthy();
    expect(screen.getByRole('button', { name: 'Group 2, open' })).toBeTruthy();
    press('Group 1, 3.896');
    expect(screen.getByRole<HTMLInputElement>('textbox').value).toBe('3.896');
  });

  it('spreads a pasted list over the groups from the present one on', () => {
    render(<Pad count={7} />);
    press('Skip G1');
    paste(screen.getByRole('textbox'), '3,896\n3,895\n3,894\n3,893\n3,892\n3,891');
    expect(values()).toEqual(['', '3,896', '3,895', '3,894', '3,893', '3,892', '3,891']);
  });

  it('takes none of 7 voltages from the second of 7 groups on; says so and shows them till a key is pressed', () => {
    render(<Pad count={7} />);
    type('3.9');
    press('On to G2');
    paste(screen.getByRole('textbox'), '3,896\n3,895\n3,894\n3,893\n3,892\n3,891\n3,890');
    expect(values()).toEqual(['3.9', '', '', '', '', '', '']);
    expect(screen.getByText('From group 2 on there is room for 6; 7 voltages were pasted.')).toBeTruthy();
    expect(screen.getByText(/3,896; 3,895; 3,894; 3,893; 3,892; 3,891; 3,890/)).toBeTruthy();
    type('4');
    expect(values()[1]).toBe('4');
    expect(screen.queryByText(/were pasted|3,896/)).toBeNull();
  });
});

describe('the fields of the groups', () => {
  it('take a list that fits', () => {
    render(<Fields count={2} />);
    paste(screen.getByLabelText('Group 1'), '3.968 3.966');
    expect(values()).toEqual(['3.968', '3.966']);
  });

  it('take none of 4 voltages for 2 groups: what was typed stays, the field says how many there are, the 4 stay in sight', () => {
    render(<Fields count={2} />);
    fireEvent.change(screen.getByLabelText('Group 1'), { target: { value: '3.9' } });
    paste(screen.getByLabelText('Group 1'), '3.968 3.966 3.961 3.960');
    expect(values()).toEqual(['3.9', '']);
    const field = screen.getByLabelText(/^Group 1/);
    expect(field.getAttribute('aria-invalid')).toBe('true');
    expect(screen.getByText('This type has 2 groups; 4 voltages were typed.')).toBeTruthy();
    expect(screen.getByText(/3\.968; 3\.966; 3\.961; 3\.960/)).toBeTruthy();
    fireEvent.change(field, { target: { value: '3.968' } });
    expect(screen.queryByText(/4 voltages/)).toBeNull();
  });
});

describe('a pasted list', () => {
  it.each([
    ['3.968 3.966', ['3.968', '3.966']],
    ['3,968; 3,966', ['3,968', '3,966']],
    ['3.968, 3.966, 3.961', ['3.968', '3.966', '3.961']],
    ['3.968 V\n3.966 V', ['3.968', '3.966']],
    ['3.968,3.966', ['3.968', '3.966']],
  ])('%j is told apart', (text, list) => expect(pastedVolts(text)).toEqual(list));

  it.each(['3,968', '3.968 V', 'G1 3.968', '3,968,3,966', ''])('%j is one value', (text) =>
    expect(pastedVolts(text)).toBeNull(),
  );

  it('names open groups shortly', () => {
    expect(groupList([3])).toBe('G3');
    expect(groupList([3, 5])).toBe('G3 and G5');
    expect(groupList([1, 2, 3, 4, 5, 6])).toBe('G1, G2, G3 and 3 more');
  });
});
