import { useController, type FieldPath, type FieldValues, type UseFormReturn } from 'react-hook-form';
import { fieldSentence } from '@/shared/contract/field-sentence';
import { CheckBox } from '../primitives/check-box';
import { Field, type FieldProps } from '../primitives/field';
import { Select, type SelectOption } from '../primitives/select';

/** A form of typed texts and choices, as react-hook-form holds it. */
export type TypedForm<V extends FieldValues> = UseFormReturn<V, unknown, V>;

interface Bound<V extends FieldValues> {
  form: TypedForm<V>;
  name: FieldPath<V>;
}

/** What a control of the kit takes of the form: value, what changes it, its error, and the way to it for the focus. */
export function useBound<V extends FieldValues>({ form, name }: Bound<V>) {
  const { field, fieldState } = useController<V>({ control: form.control as never, name });
  return {
    value: field.value as unknown,
    onChange: field.onChange as (value: unknown) => void,
    onBlur: field.onBlur,
    ref: field.ref,
    error: fieldState.error ? fieldSentence(fieldState.error.message) : undefined,
  };
}

/** A field of the form. Checked when it is left; gets the focus when it is the first wrong one. */
export function BoundField<V extends FieldValues>({
  form,
  name,
  onLeave,
  ...look
}: Bound<V> &
  Omit<FieldProps, 'value' | 'onChangeText' | 'onBlur' | 'error' | 'ref'> & {
    /** After the check of a field that was left. */
    onLeave?: () => void;
  }) {
  const { value, onChange, onBlur, ...bound } = useBound({ form, name });
  const leave = () => {
    onBlur();
    onLeave?.();
  };
  return <Field {...look} {...bound} value={String(value ?? '')} onChangeText={onChange} onBlur={leave} />;
}

/** A choice among named values; an empty text is nothing chosen. */
export function BoundSelect<V extends FieldValues>({
  form,
  name,
  label,
  options,
  empty,
  hint,
  readOnly,
}: Bound<V> & {
  label: string;
  options: readonly SelectOption<string>[];
  empty?: string;
  hint?: string;
  readOnly?: boolean;
}) {
  const { value, ...bound } = useBound({ form, name });
  const typed = typeof value === 'string' ? value : '';
  if (readOnly) {
    const chosen = options.find((option) => option.value === typed);
    return <Field label={label} value={chosen?.label ?? ''} onChangeText={() => {}} readOnly hint={hint} />;
  }
  return (
    <Select
      {...bound}
      label={label}
      value={typed === '' && empty !== undefined ? null : typed}
      options={options}
      empty={empty}
      hint={hint}
    />
  );
}

/** A yes or no of the form. */
export function BoundCheck<V extends FieldValues>({
  form,
  name,
  title,
  meaning,
  readOnly,
}: Bound<V> & { title: string; meaning?: string; readOnly?: boolean }) {
  const { value, onChange, error } = useBound({ form, name });
  return (
    <CheckBox
      checked={value === true}
      onChange={onChange}
      title={title}
      meaning={meaning}
      error={error}
      disabled={readOnly}
    />
  );
}
