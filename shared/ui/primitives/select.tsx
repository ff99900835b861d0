import { useId, useImperativeHandle, useRef, useState, type Ref } from 'react';
import { View } from 'react-native';
import { Icon } from '../icons/icon';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { faceStacks, radius, stroke, touch, typeScale } from '../theme/tokens';
import { domElement } from './dom-element';
import type { FieldHandle } from './field';
import { describedBy, FieldFrame, fieldIds, type FieldFrameProps } from './field-frame';
import { useLeaving } from './leaving';

export interface SelectOption<V extends string> {
  value: V;
  label: string;
  disabled?: boolean;
}

/** A choice among more than four words: the browser's own list, which every phone shows in its own large way. */
export function Select<V extends string>({
  value,
  options,
  onChange,
  onBlur,
  empty,
  disabled = false,
  required,
  size = 'normal',
  ref,
  ...frame
}: FieldFrameProps & {
  /** null while nothing is chosen; then `empty` is shown. */
  value: V | null;
  options: readonly SelectOption<V>[];
  onChange: (value: V) => void;
  onBlur?: () => void;
  /** What stands there before a choice: 'Choose a channel'. Without it the first option is chosen by the browser. */
  empty?: string;
  disabled?: boolean;
  required?: boolean;
  size?: 'low' | 'normal';
  ref?: Ref<FieldHandle>;
}) {
  const styles = useStyles();
  const id = useId();
  const element = useRef<HTMLSelectElement>(null);
  const [focused, setFocused] = useState(false);
  const leave = useLeaving(onBlur);
  useImperativeHandle(ref, () => ({
    focus: () => element.current?.focus(),
    blur: () => element.current?.blur(),
    select: () => element.current?.focus(),
  }));
  return (
    <FieldFrame id={id} onLabelPress={() => element.current?.focus()} {...frame}>
      <View
        style={[
          styles.box,
          { height: size === 'low' ? touch.min : touch.primary },
          frame.error !== undefined && styles.bad,
          focused && styles.focused,
          disabled && styles.off,
        ]}
      >
        {domElement('select', {
          ref: element,
          value: value ?? '',
          disabled,
          onChange: (event: { target: { value: string } }) => onChange(event.target.value as V),
          onFocus: () => setFocused(true),
          onBlur: () => {
            setFocused(false);
            leave();
          },
          'aria-labelledby': fieldIds(id).label,
          'aria-label': frame.label,
          'aria-describedby': describedBy(id, frame),
          'aria-invalid': frame.error !== undefined || undefined,
          'aria-required': required,
          style: [styles.select, value === null && styles.empty],
          children: [
            empty !== undefined && value === null
              ? domElement('option', { key: '', value: '', disabled: true, children: empty })
              : null,
            ...options.map((option) =>
              domElement('option', {
                key: option.value,
                value: option.value,
                disabled: option.disabled,
                children: option.label,
              }),
            ),
          ],
        })}
        <View style={styles.mark}>
          <Icon name="down" size={20} tone={disabled ? 'ink3' : 'ink'} />
        </View>
      </View>
    </FieldFrame>
  );
}

const useStyles = makeStyles((theme) => ({
  box: {
    borderRadius: radius.control,
    backgroundColor: theme.colors.sheet,
    ...innerFrame(theme, stroke.control, theme.colors.edge),
    justifyContent: 'center',
    overflow: 'hidden',
  },
  focused: innerFrame(theme, stroke.focus, theme.colors.focus),
  bad: innerFrame(theme, stroke.chosen, theme.colors.alarm),
  off: { backgroundColor: theme.colors.well, boxShadow: 'none' },
  select: {
    appearance: 'none',
    WebkitAppearance: 'none',
    backgroundColor: 'transparent',
    border: 0,
    outlineStyle: 'none',
    position: 'absolute',
    top: 0,
    right: 0,
    bottom: 0,
    left: 0,
    width: '100%',
    paddingLeft: 14,
    paddingRight: 44,
    color: theme.colors.ink,
    fontFamily: faceStacks.text,
    fontSize: typeScale.body.size,
    fontVariant: ['tabular-nums'],
  } as object,
  empty: { color: theme.colors.ink2 },
  mark: { position: 'absolute', right: 14, pointerEvents: 'none' },
}));
