import { act, fireEvent, render, screen, waitFor } from '@testing-library/react';
import * as z from 'zod/mini';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { ApiProblem, OfflineError } from '@/shared/client/api-problem';
import { ClientProvider } from '@/shared/client/client-provider';
import { useDraft } from '@/shared/client/drafts';
import { useContractForm, useFormField, wrongSentence } from '@/shared/client/forms';
import { queryClient } from '@/shared/client/query-client';
import { sessionQuery } from '@/shared/client/session';
import { text } from '@/shared/contract/common';
import type { SessionDto } from '@/shared/contract/session';
import { groupVolts, quantity } from '@/shared/contract/quantity';
import { Button } from '@/shared/ui/primitives/button';
import { Field } from '@/shared/ui/primitives/field';
import { pressFrom } from '../../support/press';

const schema = z.object({
  label: text('The label', 30),
  volts: groupVolts,
  amps: quantity({ name: 'Current', unit: 'A', min: 0, aboveMin: true, max: 100 }),
  pin: z.string(),
});
type Output = z.infer<typeof schema>;

const signIn = (id: string | null) => {
  const session: SessionDto | null =
    id === null
      ? null
      : {
          person: { id, name: id, email: `${id}@example.com`, role: 'technician' },
          workshop: { id: 'w', name: 'W', zone: 'UTC' },
          capabilities: [],
          expiresAt: '2027-01-01T00:00:00.000Z',
        };
  queryClient.setQueryData(sessionQuery().queryKey, session);
};

function Form({ send }: { send: (output: Output) => Promise<unknown> }) {
  const f = useContractForm({
    schema,
    initial: { label: '', volts: '', amps: '', pin: '' },
    draft: 'test',
    secret: ['pin'],
    send,
  });
  return (
    <>
      <Field label="Label" {...useFormField(f, 'label')} />
      <Field label="Volts" {...useFormField(f, 'volts')} />
      <Field label="Amps" {...useFormField(f, 'amps')} />
      <Field label="Pin" {...useFormField(f, 'pin')} />
      <Button title="Send" onPress={() => void f.submit()} />
      <p>{f.problem}</p>
      <p>{f.wrong > 0 ? wrongSentence(f.wrong) : ''}</p>
    </>
  );
}

const open = (send: (output: Output) => Promise<unknown> = async () => {}) =>
  render(<Form send={send} />, { wrapper: ClientProvider });
const field = (label: string) => screen.getByLabelText(label) as HTMLInputElement;
const type = (label: string, value: string) => {
  fireEvent.change(field(label), { target: { value } });
  fireEvent.blur(field(label));
};
const press = () => act(async () => void fireEvent.click(screen.getByText('Send')));

beforeEach(() => {
  queryClient.clear();
  localStorage.clear();
  signIn('ines');
});

describe('a form on the contract', () => {
  // The slips that the issue names, each with the contract's own sentence.
  it.each([
    ['Volts', '39.68 V', /39\.68/],
    ['Volts', '3968', /mV|millivolts/i],
    ['Volts', 'letters', /no number/],
    ['Amps', '-5 A', /−5|too little/],
    ['Amps', '0', /more than/],
  ])('says at %s what is wrong with %j and keeps it as typed', async (label, typed, sentence) => {
    open();
    type(label, typed);
    await screen.findByText(sentence);
    expect(field(label).value).toBe(typed);
  });

  it('does not scold while one types, only on leaving the field', async () => {
    open();
    fireEvent.change(field('Volts'), { target: { value: '39.6' } });
    await act(async () => {});
    expect(screen.queryByText(/39\.6/)).toBeNull();
  });

  it('takes a sentence away at the first key that answers it, and judges again on leaving', async () => {
    open();
    type('Volts', 'letters');
    await screen.findByText(/no number/);
    fireEvent.change(field('Volts'), { target: { value: 'letter' } });
    expect(screen.queryByText(/no number/)).toBeNull();
    type('Volts', 'letter');
    await screen.findByText(/“letter” is no number/);
  });

  it('leaves the sentences of other fields where they are while one is typed in', async () => {
    open();
    type('Volts', 'letters');
    await screen.findByText(/“letters” is no number/);
    fireEvent.change(field('Amps'), { target: { value: '10' } });
    expect(screen.getByText(/“letters” is no number/)).toBeTruthy();
  });

  it('goes to the first wrong field, says how many, and sends nothing', async () => {
    const send = vi.fn(async () => {});
    open(send);
    type('Volts', '3,957 V');
    await press();
    await screen.findByText('2 fields need a change.');
    expect(document.activeElement).toBe(field('Label'));
    expect(send).not.toHaveBeenCalled();
  });

  it('sends what the schema reads: 3,957 V is 3.957', async () => {
    const send = vi.fn(async () => {});
    open(send);
    type('Label', ' S-0402 ');
    type('Volts', '3,957 V');
    type('Amps', '10');
    await press();
    await waitFor(() => expect(send).toHaveBeenCalledWith({ label: 'S-0402', volts: 3.957, amps: 10, pin: '' }));
  });

  it('puts the server’s sentences at their fields and keeps everything typed', async () => {
    open(async () => {
      throw new ApiProblem({ status: 400, code: 'invalid', fields: { volts: 'Over this type’s 4.20 V.' } });
    });
    type('Label', 'S-0402');
    type('Volts', '4.3');
    type('Amps', '10');
    await press();
    await screen.findByText('Over this type’s 4.20 V.');
    expect(document.activeElement).toBe(field('Volts'));
    expect([field('Label').value, field('Volts').value]).toEqual(['S-0402', '4.3']);
  });

  it('says over the foot what no field is to blame for', async () => {
    open(async () => {
      throw new OfflineError();
    });
    type('Label', 'S-0402');
    type('Volts', '3.9');
    type('Amps', '10');
    await press();
    await screen.findByText(/^No connection to the server/);
    expect(field('Volts').value).toBe('3.9');
  });
});

describe.each(['mouse', 'touch'] as const)('a press (%s) straight from a field', (pointer) => {
  const send = () => screen.getByRole('button', { name: 'Send' });
  const put = (label: string, value: string) => fireEvent.change(field(label), { target: { value } });

  it('moves nothing before the click when the field is wrong, then says so and how many', async () => {
    const sent = vi.fn(async () => {});
    open(sent);
    put('Label', 'S-0402');
    put('Volts', '39.68 V');
    put('Amps', '0');
    const { down, click } = await pressFrom(field('Amps'), send, pointer);
    expect(click).toBe(down);
    await screen.findByText('2 fields need a change.');
    await screen.findByText(/39\.68/);
    expect(document.activeElement).toBe(field('Volts'));
    expect([field('Volts').value, field('Amps').value]).toEqual(['39.68 V', '0']);
    expect(sent).not.toHaveBeenCalled();
  });

  it('sends a form whose last field was just put right, without a sentence moving the button', async () => {
    const sent = vi.fn(async () => {});
    open(sent);
    put('Label', 'S-0402');
    put('Amps', '10');
    type('Volts', 'letters');
    await screen.findByText(/no number/);
    put('Volts', '3.9');
    const { down, click } = await pressFrom(field('Volts'), send, pointer);
    expect(click).toBe(down);
    await waitFor(() => expect(sent).toHaveBeenCalledOnce());
  });

  it('sends again what the server refused, its sentence standing until the click', async () => {
    const sent = vi.fn(async () => {
      throw new ApiProblem({ status: 400, code: 'invalid', fields: { volts: 'Over this type’s 4.20 V.' } });
    });
    open(sent);
    put('Label', 'S-0402');
    put('Volts', '4.3');
    put('Amps', '10');
    await press();
    await screen.findByText('Over this type’s 4.20 V.');
    const { down, click } = await pressFrom(field('Volts'), send, pointer);
    expect(down).toContain('Over this type');
    expect(click).toBe(down);
    await waitFor(() => expect(sent).toHaveBeenCalledTimes(2));
    expect(field('Volts').value).toBe('4.3');
  });
});

describe('what was typed', () => {
  it('comes back after leaving the form, but never a secret', async () => {
    const { unmount } = open();
    type('Label', 'S-0402');
    type('Volts', '3,9');
    type('Pin', '1234');
    await act(async () => {});
    unmount();
    open();
    expect([field('Label').value, field('Volts').value, field('Pin').value]).toEqual(['S-0402', '3,9', '']);
    expect(JSON.stringify({ ...localStorage })).not.toContain('1234');
  });

  it('is another person’s own', async () => {
    const { unmount } = open();
    type('Label', 'S-0402');
    await act(async () => {});
    unmount();
    signIn('bram');
    open();
    expect(field('Label').value).toBe('');
  });

  it('is gone once it was sent', async () => {
    const { unmount } = open();
    type('Label', 'S-0402');
    type('Volts', '3.9');
    type('Amps', '10');
    await press();
    unmount();
    open();
    expect(field('Label').value).toBe('');
  });
});

describe('useDraft', () => {
  const empty = { note: '' };
  function Note({ form }: { form: string }) {
    const draft = useDraft(form, empty);
    return (
      <>
        <input
          aria-label="Note"
          value={draft.value.note}
          onChange={(event) => draft.set({ note: event.target.value })}
        />
        <button onClick={draft.clear}>Clear</button>
        <p>{draft.restored ? 'brought back' : 'new'}</p>
      </>
    );
  }
  const show = (form: string) => render(<Note form={form} />, { wrapper: ClientProvider });

  it('brings a draft back, changes with its object, and clears', () => {
    const first = show('log.c1');
    fireEvent.change(field('Note'), { target: { value: 'clip 2 warm' } });
    first.unmount();

    const again = show('log.c1');
    expect([field('Note').value, screen.queryByText('brought back') !== null]).toEqual(['clip 2 warm', true]);
    again.rerender(<Note form="log.c2" />);
    expect([field('Note').value, screen.queryByText('new') !== null]).toEqual(['', true]);
    again.rerender(<Note form="log.c1" />);
    expect(field('Note').value).toBe('clip 2 warm');
    fireEvent.click(screen.getByText('Clear'));
    again.unmount();
    show('log.c1');
    expect(field('Note').value).toBe('');
  });
});
