import { useState, type Ref } from 'react';
import { Field, type FieldHandle, type FieldProps } from '../primitives/field';
import { Link } from '../primitives/link';

/** A password: hidden until shown, pasted and filled by managers as it is. */
export function PasswordField({
  fresh = false,
  ref,
  ...field
}: Pick<FieldProps, 'label' | 'value' | 'onChangeText' | 'onBlur' | 'error' | 'hint' | 'onSubmit' | 'nextKey'> & {
  /** A new one is being chosen. */
  fresh?: boolean;
  ref?: Ref<FieldHandle>;
}) {
  const [shown, setShown] = useState(false);
  return (
    <Field
      {...field}
      ref={ref}
      required
      kind={shown ? 'label' : 'password'}
      autoComplete={fresh ? 'new-password' : 'current-password'}
      suffix={
        <Link
          title={shown ? 'Hide' : 'Show'}
          label={shown ? 'Hide the password' : 'Show the password'}
          kind="small"
          tone="ink2"
          onPress={() => setShown(!shown)}
          style={{ alignItems: 'flex-end' }}
        />
      }
    />
  );
}
