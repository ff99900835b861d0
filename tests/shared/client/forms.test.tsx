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
import { Field } from '@/shared/ui/primitives/field';

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
      <button onClick={() => void f.submit()}>Send</button>
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
