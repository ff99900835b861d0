import { useRef } from 'react';
import { Pressable, TextInput, View } from 'react-native';
import { groupVolts as groupRule } from '@/shared/contract/quantity';
import { useFormats } from '../format/formats';
import { volts as voltsText } from '../format/quantities';
import { pastedVolts } from '../group-volts/group-form';
import { usePastedVolts } from '../group-volts/use-pasted-volts';
import { Icon } from '../icons/icon';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { faceStacks, radius, stroke, touch, typeScale } from '../theme/tokens';
import { web } from '../theme/web-props';

/** The sentence of a typed group; null: it is a voltage, or still open. */
export function typedProblem(text: string): string | null {
  if (text.trim() === '') return null;
  const read = groupRule.safeParse(text);
  return read.success ? null : (read.error.issues[0]?.message ?? null);
}

/** The voltage of a typed group, V; null: open, or no voltage. */
export function typedVolts(text: string): number | null {
  const read = text.trim() === '' ? null : groupRule.safeParse(text);
  return read?.success ? read.data : null;
}

/**
 * The groups of a pack one after the other, with keys of 48 px in place of the system's. A skipped group stays open; a
 * hardware keyboard works too, and a list pasted into the field goes on into the groups after it.
 */
export function TypedPad({
  values,
  present,
  positions,
  onPut,
  onGo,
}: {
  /** As typed, one for each group of the pack. */
  values: readonly string[];
  /** 0-based. */
  present: number;
  /** Module position of each group. */
  positions: readonly string[];
  /** Puts texts into the groups from one on. */
  onPut: (from: number, texts: readonly string[]) => void;
  onGo: (group: number) => void;
}) {
  const styles = useStyles();
  const { marks } = useFormats();
  const input = useRef<TextInput>(null);
  const count = values.length;
  const value = values[present] ?? '';
  const put = (text: string) => {
    const many = pastedVolts(text);
    onPut(present, many ? many.slice(0, count - present) : [text]);
  };
  const box = usePastedVolts((many) => onPut(present, many.slice(0, count - present)));
  const go = (group: number) => {
    onGo(Math.min(count - 1, Math.max(0, group)));
    input.current?.focus();
  };
  const error = typedProblem(value);
  const last = present === count - 1;
  const key = (name: string) =>
    name === 'rub' ? put(value.slice(0, -1)) : put(name === marks.decimal && /[.,]/.test(value) ? value : value + name);
  const beside = (group: number) => {
    const volts = typedVolts(values[group] ?? '');
    return group < 0 || group >= count ? null : (
      <View style={styles.row}>
        <Txt kind="numS" style={styles.name}>{`G${group + 1}`}</Txt>
        <Txt kind="body" tone="ink2">
          {volts === null ? (group < present ? 'open' : 'to come') : voltsText(volts, marks)}
        </Txt>
      </View>
    );
  };
  return (
    <View style={{ rowGap: 6 }}>
      {beside(present - 1)}
      <View style={styles.row}>
        <View style={styles.name}>
          <Txt kind="numM">{`G${present + 1}`}</Txt>
          <Txt kind="small" tone="ink2">{`module ${positions[present] ?? ''}`}</Txt>
        </View>
        <View ref={box} style={[styles.box, error ? styles.bad : null]}>
          <TextInput
            ref={input}
            value={value}
            onChangeText={put}
            inputMode="none"
            autoCorrect={false}
            autoComplete="off"
            onSubmitEditing={() => go(present + 1)}
            submitBehavior="submit"
            aria-label={`Group ${present + 1}, volts`}
            {...web({ 'aria-describedby': 'typed-says', 'aria-invalid': error !== null || undefined })}
            style={styles.input}
          />
          <Txt tone="ink2">V</Txt>
        </View>
      </View>
      <View style={styles.says} nativeID="typed-says">
        {error ? (
          <Txt kind="label" tone="alarm">
            {error}
          </Txt>
        ) : null}
      </View>
      {beside(present + 1)}
      <View style={styles.walk}>
        <Button
          look="line"
          size="small"
          title={present === 0 ? 'Back' : `Back to G${present}`}
          disabled={present === 0}
          onPress={() => go(present - 1)}
          grow
        />
        {last ? null : (
          <Button
            look={value.trim() === '' ? 'line' : 'primary'}
            size="small"
            title={value.trim() === '' ? `Skip G${present + 1}` : `On to G${present + 2}`}
            onPress={() => go(present + 1)}
            grow
          />
        )}
      </View>
      <View style={styles.keys} role="group" aria-label="Number keys">
        {['1', '2', '3', '4', '5', '6', '7', '8', '9', marks.decimal, '0', 'rub'].map((name) => (
          <Pressable
            key={name}
            role="button"
            aria-label={name === 'rub' ? 'Rub out' : name === marks.decimal ? 'Decimal mark' : name}
            onPress={() => key(name)}
            // The keys do not take the focus from the field.
            {...web({ tabIndex: -1, dataSet: { press: '' } })}
            style={({ pressed }) => [styles.key, pressed && styles.pressed]}
          >
            {name === 'rub' ? <Icon name="rub" size={26} /> : <Txt kind="numM">{name}</Txt>}
          </Pressable>
        ))}
      </View>
    </View>
  );
}

const useStyles = makeStyles((theme) => ({
  row: { flexDirection: 'row', alignItems: 'center', columnGap: 12, minHeight: 36 },
  name: { width: 96 },
  box: {
    flex: 1,
    flexDirection: 'row',
    alignItems: 'center',
    minHeight: 72,
    paddingHorizontal: 14,
    borderRadius: radius.control,
    backgroundColor: theme.colors.sheet,
    ...innerFrame(theme, stroke.focus, theme.colors.focus),
  },
  bad: innerFrame(theme, stroke.chosen, theme.colors.alarm),
  input: {
    flexGrow: 1,
    flexShrink: 1,
    minWidth: 0,
    alignSelf: 'stretch',
    color: theme.colors.ink,
    fontFamily: faceStacks.num,
    fontWeight: '600',
    fontSize: typeScale.numL.size,
    lineHeight: typeScale.numL.line,
    fontVariant: ['tabular-nums'],
  },
  says: { minHeight: 20, justifyContent: 'center' },
  walk: { flexDirection: 'row', columnGap: touch.gap },
  keys: { flexDirection: 'row', flexWrap: 'wrap', gap: touch.gap },
  key: {
    height: touch.min,
    width: 'calc((100% - 16px) / 3)' as unknown as number,
    alignItems: 'center',
    justifyContent: 'center',
    borderRadius: radius.control,
    backgroundColor: theme.colors.sheet,
    ...innerFrame(theme, stroke.control, theme.colors.edge),
  },
  pressed: { backgroundColor: theme.colors.well },
}));
