import type { FieldPath, FieldValues } from 'react-hook-form';
import { useFormats } from '../format/formats';
import { dayOf, instantOfDay } from '../format/zone';
import { useBound, type TypedForm } from '../forms/bound';
import { Link } from '../primitives/link';
import { DayField } from './day-field';

const noon = 12 * 60;

/** A day of the form that is kept as an instant: noon of that day in the workshop's zone, so that no zone makes another day of it. */
export function BoundDay<V extends FieldValues>({
  form,
  name,
  label,
  hint,
  today,
  readOnly,
}: {
  form: TypedForm<V>;
  name: FieldPath<V>;
  label: string;
  hint?: string;
  /** Today there, 'YYYY-MM-DD': the last day that can be. */
  today: string;
  readOnly: boolean;
}) {
  const { zone } = useFormats();
  const { value, onChange, ...bound } = useBound({ form, name });
  const put = (day: string) => onChange(day === '' ? '' : new Date(instantOfDay(day, noon, zone)).toISOString());
  const instant = typeof value === 'string' && value !== '' ? Date.parse(value) : null;
  return (
    <DayField
      {...bound}
      label={label}
      hint={hint}
      value={instant === null ? '' : dayOf(instant, zone)}
      latest={today}
      onChange={put}
      readOnly={readOnly}
      beside={
        readOnly ? null : (
          <Link kind="small" tight align="right" title="today" label={`${label}: today`} onPress={() => put(today)} />
        )
      }
    />
  );
}
