import { useController, type Control, type FieldPath, type FieldValues } from 'react-hook-form';
import { Field, type FieldProps } from '../primitives/field';

/** A field of the kit under react-hook-form, by the name of its value. */
export function BoundField<Values extends FieldValues>({
  control,
  name,
  onLeave,
  ...field
}: Omit<FieldProps, 'value' | 'onChangeText' | 'onBlur' | 'ref' | 'error'> & {
  control: Control<Values>;
  name: FieldPath<Values>;
  onLeave?: () => void;
}) {
  const {
    field: { ref, value, onChange, onBlur },
    fieldState,
  } = useController({ control, name });
  return (
    <Field
      {...field}
      value={value ?? ''}
      onChangeText={onChange}
      onBlur={() => {
        onBlur();
        onLeave?.();
      }}
      ref={ref}
      error={fieldState.error?.message}
    />
  );
}
