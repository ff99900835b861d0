import { useId, useImperativeHandle, useRef, useState, type ReactNode, type Ref } from 'react';
import { TextInput, View, type TextInputProps } from 'react-native';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { faceStacks, radius, stroke, touch, typeScale } from '../theme/tokens';
import { web } from '../theme/web-props';
import { describedBy, FieldFrame, fieldIds, type FieldFrameProps } from './field-frame';
import { useLeaving } from './leaving';
import { Txt } from './txt';

export interface FieldProps extends FieldFrameProps {
  /** As typed. Nothing is rewritten while a person types. */
  value: string;
  onChangeText: (text: string) => void;
  /** It was left; after a press elsewhere only once that press is over. */
  onBlur?: () => void;
  onFocus?: () => void;
  /** 'decimal' and 'whole' bring the number keys and the large numerals; 'text' is words. */
  kind?: 'text' | 'decimal' | 'whole' | 'email' | 'password' | 'search' | 'label';
  /** Small and after: 'V'. */
  unit?: string;
  /** Instead of a unit: a link or a word at the right inside the box. */
  suffix?: ReactNode;
  prefix?: ReactNode;
  /** No box; the value stays readable and selectable. */
  readOnly?: boolean;
  required?: boolean;
  placeholder?: string;
  /** 'low' 48 px, 'normal' 56, 'large' 72 with the big numerals (the present group). */
  size?: 'low' | 'normal' | 'large';
  multiline?: boolean;
  /** Lines shown of a multiline field. */
  lines?: number;
  maxLength?: number;
  autoComplete?: TextInputProps['autoComplete'];
  autoFocus?: boolean;
  /** What the Next key does; left out, it is 'done'. */
  onSubmit?: () => void;
  nextKey?: 'next' | 'done' | 'search' | 'send';
  ref?: Ref<FieldHandle>;
}

/** What a form needs of a field: to go to the first error. */
export interface FieldHandle {
  focus(): void;
  blur(): void;
  /** Marks the whole value, so that the next key replaces it. */
  select(): void;
}

const keyboards: Record<NonNullable<FieldProps['kind']>, TextInputProps> = {
  text: {},
  decimal: { inputMode: 'decimal', autoCorrect: false, autoCapitalize: 'none', autoComplete: 'off' },
  whole: { inputMode: 'numeric', autoCorrect: false, autoCapitalize: 'none', autoComplete: 'off' },
  email: { inputMode: 'email', autoCorrect: false, autoCapitalize: 'none', autoComplete: 'email' },
  password: { secureTextEntry: true, autoCorrect: false, autoCapitalize: 'none', autoComplete: 'current-password' },
  search: { inputMode: 'search', autoCorrect: false, autoCapitalize: 'none', autoComplete: 'off' },
  label: { autoCorrect: false, autoCapitalize: 'none', autoComplete: 'off' },
};
const heights = { low: touch.min, normal: touch.primary, large: 72 } as const;

/**
 * A labelled box to type in. Works under react-hook-form's `Controller`: pass `value`, `onChangeText={field.onChange}`,
 * `onBlur={field.onBlur}`, `ref={field.ref}`.
 */
export function Field({
  value,
  onChangeText,
  onBlur,
  onFocus,
  kind = 'text',
  unit,
  suffix,
  prefix,
  readOnly = false,
  required,
  placeholder,
  size = 'normal',
  multiline,
  lines = 4,
  maxLength,
  autoComplete,
  autoFocus,
  onSubmit,
  nextKey = 'done',
  ref,
  ...frame
}: FieldProps) {
  const styles = useStyles();
  const id = useId();
  const input = useRef<TextInput>(null);
  const [focused, setFocused] = useState(false);
  const leave = useLeaving(onBlur);
  useImperativeHandle(ref, () => ({
    focus: () => input.current?.focus(),
    blur: () => input.current?.blur(),
    select: () => {
      input.current?.focus();
      (input.current as unknown as { select?: () => void } | null)?.select?.();
    },
  }));
  const bad = frame.error !== undefined || frame.verdict?.inside === false;
  const numeric = kind === 'decimal' || kind === 'whole';
  const keyboard = keyboards[kind];
  return (
    <FieldFrame id={id} onLabelPress={() => input.current?.focus()} {...frame}>
      <View
        style={[
          styles.box,
          { minHeight: heights[size] },
          readOnly && styles.readOnly,
          bad && styles.bad,
          focused && !readOnly && styles.focused,
          multiline && styles.tall,
        ]}
      >
        {prefix}
        <TextInput
          ref={input}
          value={value}
          onChangeText={onChangeText}
          onBlur={() => {
            setFocused(false);
            leave();
          }}
          onFocus={() => {
            setFocused(true);
            onFocus?.();
          }}
          {...keyboard}
          autoComplete={autoComplete ?? keyboard.autoComplete}
          readOnly={readOnly}
          placeholder={placeholder}
          placeholderTextColor={styles.placeholder.color}
          multiline={multiline}
          numberOfLines={multiline ? lines : undefined}
          maxLength={maxLength}
          autoFocus={autoFocus}
          onSubmitEditing={onSubmit}
          submitBehavior={multiline ? 'newline' : 'submit'}
          enterKeyHint={nextKey}
          aria-labelledby={fieldIds(id).label}
          // The same words: checkers count a label that is scrolled out of sight as none.
          aria-label={frame.label}
          {...web({
            'aria-describedby': describedBy(id, frame),
            'aria-invalid': frame.error !== undefined || undefined,
            'aria-required': required,
            spellCheck: kind === 'text',
          })}
          style={[styles.input, numeric && styles.numeric, size === 'large' && styles.large]}
        />
        {unit ? (
          <Txt tone="ink2" nowrap>
            {unit}
          </Txt>
        ) : null}
        {suffix}
      </View>
    </FieldFrame>
  );
}

const numM = typeScale.numM;
const useStyles = makeStyles((theme) => ({
  box: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 8,
    borderRadius: radius.control,
    backgroundColor: theme.colors.sheet,
    paddingHorizontal: 14,
    ...innerFrame(theme, stroke.control, theme.colors.edge),
  },
  focused: innerFrame(theme, stroke.focus, theme.colors.focus),
  bad: innerFrame(theme, stroke.chosen, theme.colors.alarm),
  readOnly: { backgroundColor: 'transparent', boxShadow: 'none', borderWidth: 0, paddingHorizontal: 0 },
  tall: { alignItems: 'flex-start' },
  input: {
    flexGrow: 1,
    flexShrink: 1,
    flexBasis: 0,
    minWidth: 0,
    alignSelf: 'stretch',
    paddingVertical: 8,
    color: theme.colors.ink,
    fontFamily: faceStacks.text,
    fontSize: typeScale.body.size,
    lineHeight: typeScale.body.line,
    fontVariant: ['tabular-nums'],
  },
  numeric: { fontFamily: faceStacks.num, fontWeight: '600', fontSize: numM.size, lineHeight: numM.line },
  large: {
    fontFamily: faceStacks.num,
    fontWeight: '600',
    fontSize: typeScale.numL.size,
    lineHeight: typeScale.numL.line,
  },
  placeholder: { color: theme.colors.ink2 },
}));
