import type { ReactNode, Ref } from 'react';
import { useController, type FieldPath, type FieldValues, type UseFormReturn } from 'react-hook-form';
import { fieldSentence } from '@/shared/contract/field-sentence';
import type { FieldHandle } from '../primitives/field';

export interface TypedFieldProps {
  value: string;
  onChange: (value: string) => void;
  onChangeText: (value: string) => void;
  onBlur: () => void;
  ref: Ref<FieldHandle>;
  error: string | undefined;
}

/** One text of a form. What zod says of a choice nobody has made is told in the field's own words. */
export function TypedField<Values extends FieldValues>({
  form,
  name,
  missing,
  judge,
  children,
}: {
  form: UseFormReturn<Values, unknown, Values>;
  name: FieldPath<Values>;
  /** The sentence where it was left empty. */
  missing?: string;
  /** Judges what stands in a field that was left, where the form's own check has not got to it yet. */
  judge?: (value: string) => string | null;
  children: (field: TypedFieldProps) => ReactNode;
}) {
  const { field, fieldState } = useController({ control: form.control, name });
  const value = (field.value ?? '') as string;
  const error = fieldState.error
    ? fieldSentence(value === '' && missing !== undefined ? undefined : fieldState.error.message, missing)
    : fieldState.isTouched && value !== ''
      ? (judge?.(value) ?? undefined)
      : undefined;
  return (
    <>
      {children({
        value,
        onChange: (next) => field.onChange(next),
        onChangeText: (next) => field.onChange(next),
        onBlur: field.onBlur,
        ref: field.ref as Ref<FieldHandle>,
        error,
      })}
    </>
  );
}
