import { useId, useImperativeHandle, useRef, useState, type ReactNode, type Ref } from 'react';
import { View } from 'react-native';
import { domElement } from '../primitives/dom-element';
import { Field, type FieldHandle } from '../primitives/field';
import { describedBy, FieldFrame, fieldIds } from '../primitives/field-frame';
import { useLeaving } from '../primitives/leaving';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { faceStacks, radius, stroke, touch, typeScale } from '../theme/tokens';

/** A day, 'YYYY-MM-DD' or empty: the browser's own date field, which takes typing and shows a calendar. */
export function DayField({
  value,
  onChange,
  onBlur,
  latest,
  readOnly = false,
  ref,
  ...frame
}: {
  label: string;
  value: string;
  onChange: (day: string) => void;
  onBlur?: () => void;
  /** Last day that can be, in the workshop's zone. */
  latest?: string;
  readOnly?: boolean;
  hint?: string;
  error?: string;
  beside?: ReactNode;
  ref?: Ref<FieldHandle>;
}) {
  const styles = useStyles();
  const id = useId();
  const input = useRef<HTMLInputElement>(null);
  const [focused, setFocused] = useState(false);
  const leave = useLeaving(onBlur);
  useImperativeHandle(ref, () => ({
    focus: () => input.current?.focus(),
    blur: () => input.current?.blur(),
    select: () => input.current?.focus(),
  }));
  if (readOnly) return <Field label={frame.label} value={value || 'never'} onChangeText={() => {}} readOnly />;
  return (
    <FieldFrame id={id} onLabelPress={() => input.current?.focus()} {...frame}>
      <View style={[styles.box, frame.error !== undefined && styles.bad, focused && styles.focused]}>
        {domElement('input', {
          ref: input,
          type: 'date',
          value,
          max: latest,
          onChange: (event: { target: { value: string } }) => onChange(event.target.value),
          onFocus: () => setFocused(true),
          onBlur: () => {
            setFocused(false);
            leave();
          },
          'aria-labelledby': fieldIds(id).label,
          'aria-describedby': describedBy(id, frame),
          'aria-invalid': frame.error !== undefined || undefined,
          style: styles.input,
        })}
      </View>
    </FieldFrame>
  );
}

const useStyles = makeStyles((theme) => ({
  box: {
    height: touch.primary,
    borderRadius: radius.control,
    backgroundColor: theme.colors.sheet,
    justifyContent: 'center',
    ...innerFrame(theme, stroke.control, theme.colors.edge),
  },
  focused: innerFrame(theme, stroke.focus, theme.colors.focus),
  bad: innerFrame(theme, stroke.chosen, theme.colors.alarm),
  input: {
    height: '100%',
    width: '100%',
    minWidth: 0,
    boxSizing: 'border-box',
    paddingHorizontal: 14,
    backgroundColor: 'transparent',
    borderWidth: 0,
    outlineStyle: 'none',
    color: theme.colors.ink,
    colorScheme: theme.name === 'night' ? 'dark' : 'light',
    fontFamily: faceStacks.text,
    fontSize: typeScale.body.size,
    fontVariant: ['tabular-nums'],
  } as object,
}));
