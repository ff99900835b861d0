/**
 * Forms on the contract's own schema: what the server would refuse is refused here with the same sentence. Checked on
 * leaving a field, which the kit's fields report once the press that took the focus is over; on sending the first wrong
 * field gets the focus. What is typed stays, whatever happens.
 */
import { standardSchemaResolver } from '@hookform/resolvers/standard-schema';
import { useEffect, useState } from 'react';
import {
  get,
  useController,
  useForm,
  type FieldErrors,
  type FieldPath,
  type FieldPathValue,
  type FieldValues,
  type UseFormReturn,
} from 'react-hook-form';
import type * as z from 'zod/mini';
import { fieldSentence } from '@/shared/contract/field-sentence';
import { isProblem, sentenceOf } from './api-problem';
import { readDraft, writeDraft } from './draft-store';
import { useSession } from './session';

export interface ContractFormOptions<Values extends FieldValues, Output> {
  schema: z.ZodMiniType<Output, unknown>;
  initial: Values;
  /** Keeps what is typed under this name; left out: not kept. */
  draft?: string;
  /** Fields that are never kept: passwords. */
  secret?: readonly (keyof Values & string)[];
  /** Sends it. What it throws is shown: sentences at their fields, or over the foot. */
  send: (output: Output) => Promise<unknown>;
}

export interface ContractForm<Values extends FieldValues> {
  form: UseFormReturn<Values, unknown, Values>;
  /** Checks and sends. */
  submit: () => Promise<void>;
  /** Checks every field and goes to the first wrong one, without sending: something outside the form is missing. */
  check: () => Promise<boolean>;
  busy: boolean;
  /** Why it was not taken, where no field is to blame. */
  problem: string | null;
  /** What the last sending threw: `isConflict(error)` has `present`. */
  error: unknown;
  /** Fields that need a change, after sending was tried. */
  wrong: number;
  /** Brought back from an earlier visit. */
  restored: boolean;
  /** Empties it and its draft. */
  clear: (next?: Values) => void;
}

const countOf = (errors: object): number =>
  Object.entries(errors).reduce<number>((sum, [name, error]) => {
    if (name === 'root' || !error || typeof error !== 'object') return sum;
    return sum + ('message' in error && typeof error.message === 'string' ? 1 : countOf(error as object));
  }, 0);

/** '3 fields need a change.' */
export const wrongSentence = (count: number): string =>
  count === 1 ? 'One field needs a change.' : `${count} fields need a change.`;

export function useContractForm<Values extends FieldValues, Output>({
  schema,
  initial,
  draft,
  secret = [],
  send,
}: ContractFormOptions<Values, Output>): ContractForm<Values> {
  const personId = useSession().data?.person.id ?? null;
  const [kept] = useState(() => (draft ? readDraft<Partial<Values>>(personId, draft) : null));
  const [error, setError] = useState<unknown>(null);
  const [problem, setProblem] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const [tried, setTried] = useState(false);
  const form = useForm<Values, unknown, Values>({
    // The resolver's own types want the input's shape; people type text into numbers, which the schema reads.
    resolver: standardSchemaResolver(schema as never) as never,
    defaultValues: { ...initial, ...kept } as never,
    mode: 'onBlur',
    reValidateMode: 'onBlur',
    shouldFocusError: true,
  });

  // Read in every render: react-hook-form tells only of what was read before it changed.
  const { errors } = form.formState;

  const secrets = secret.join(' ');
  useEffect(() => {
    if (!draft) return;
    return form.subscribe({
      formState: { values: true },
      callback: ({ values }) => {
        const open = Object.entries(values).filter(([name]) => !secrets.split(' ').includes(name));
        writeDraft(personId, draft, Object.fromEntries(open));
      },
    });
  }, [form, draft, personId, secrets]);

  // A sentence that is being answered goes at the first key; leaving the field judges what was typed.
  useEffect(
    () =>
      form.subscribe({
        formState: { values: true },
        callback: ({ name, errors: present }) => {
          if (name && typeof get(present, `${name}.message`) === 'string') form.clearErrors(name as FieldPath<Values>);
        },
      }),
    [form],
  );

  const refuse = (cause: unknown) => {
    setError(cause);
    const fields = isProblem(cause) ? Object.entries(cause.fields) : [];
    const known = fields.filter(([path]) => path.split('.')[0]! in form.getValues());
    known.forEach(([path, message], index) =>
      form.setError(path as FieldPath<Values>, { type: 'server', message }, { shouldFocus: index === 0 }),
    );
    const rest = fields.filter((field) => !known.includes(field)).map(([, message]) => message);
    setProblem(known.length > 0 && rest.length === 0 ? null : rest.length > 0 ? rest.join(' ') : sentenceOf(cause));
  };

  const submit = form.handleSubmit(async (output) => {
    setBusy(true);
    setError(null);
    setProblem(null);
    try {
      await send(output as unknown as Output);
      if (draft) writeDraft(personId, draft, null);
    } catch (cause) {
      refuse(cause);
    } finally {
      setBusy(false);
    }
  });

  return {
    form,
    submit: () => {
      setTried(true);
      return submit();
    },
    check: () => {
      setTried(true);
      return form.trigger(undefined, { shouldFocus: true });
    },
    busy,
    problem,
    error,
    wrong: tried ? countOf(errors as FieldErrors) : 0,
    restored: kept !== null,
    clear: (next = initial) => {
      form.reset(next);
      setTried(false);
      setError(null);
      setProblem(null);
      if (draft) writeDraft(personId, draft, null);
    },
  };
}

/** One field of the form, as a field of the kit takes it. `ref` gets the focus when it is the first wrong one. */
export function useFormField<Values extends FieldValues, Name extends FieldPath<Values>>(
  { form }: Pick<ContractForm<Values>, 'form'>,
  name: Name,
) {
  const { field, fieldState } = useController<Values, Name>({ control: form.control as never, name });
  return {
    value: field.value as FieldPathValue<Values, Name>,
    onChange: (value: FieldPathValue<Values, Name>) => field.onChange(value),
    onChangeText: (text: string) => field.onChange(text),
    onBlur: field.onBlur,
    ref: field.ref,
    error: fieldState.error ? fieldSentence(fieldState.error.message) : undefined,
  };
}
