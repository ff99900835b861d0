import type { FieldPath, FieldValues } from 'react-hook-form';
import { TimeField } from '../primitives/time-field';
import { useBound, type TypedForm } from './bound';

/** A time of day of the form: typed as '1815' or '18:15', or picked in quarter hours. */
export function BoundTime<V extends FieldValues>({
  form,
  name,
  label,
  hint,
}: {
  form: TypedForm<V>;
  name: FieldPath<V>;
  label: string;
  hint?: string;
}) {
  const { value, onChange, ...bound } = useBound({ form, name });
  return <TimeField {...bound} label={label} hint={hint} value={String(value ?? '')} onChangeText={onChange} />;
}
