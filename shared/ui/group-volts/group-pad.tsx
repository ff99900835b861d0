import { useEffect, useRef, useState } from 'react';
import { useFormState, useWatch } from 'react-hook-form';
import { Pressable, TextInput, View } from 'react-native';
import { useFormats } from '../format/formats';
import { Icon } from '../icons/icon';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { faceStacks, radius, stroke, touch, typeScale } from '../theme/tokens';
import { web } from '../theme/web-props';
import type { GroupEntryProps } from './group-fields';
import { GroupStrip } from './group-strip';
import { RefusedVolts } from './refused-paste';
import { useGroupPaste } from './use-group-paste';
import { usePastedVolts } from './use-pasted-volts';

/**
 * Many groups, one at a time, with keys of 48 px in place of the system's: the present group large, the way back and on
 * over the keys. A skipped group stays open. A hardware keyboard and paste work too.
 */
export function GroupPad({ form, count, verdictOf, onLeave, onLast }: GroupEntryProps) {
  const styles = useStyles();
  const { marks } = useFormats();
  const values = useWatch({ control: form.control, name: 'groupVolts' }) ?? [];
  const { errors } = useFormState({ control: form.control, name: 'groupVolts' });
  const [present, setPresent] = useState(() =>
    Math.max(
      0,
      values.findIndex((value) => (value ?? '') === ''),
    ),
  );
  const input = useRef<TextInput>(null);
  const value = values[present] ?? '';
  const paste = useGroupPaste(form, count);
  const error = paste.refused?.sentence ?? errors.groupVolts?.[present]?.message;
  const verdict = error ? null : (verdictOf?.(present) ?? null);

  // On send the form goes to its first wrong field: the pad turns to that group.
  useEffect(() => {
    for (let group = 0; group < count; group += 1) {
      const { ref } = form.control.register(`groupVolts.${group}`);
      ref({
        focus: () => {
          setPresent(group);
          input.current?.focus();
        },
      });
    }
  }, [form, count]);

  const put = (text: string) => {
    paste.forget();
    form.setValue(`groupVolts.${present}`, text, { shouldDirty: true });
  };
  const box = usePastedVolts((many) => {
    if (!paste.put(present, many)) return;
    setPresent(Math.min(count - 1, present + many.length));
  });
  const go = (group: number) => {
    if (value.trim() !== '') void form.trigger(`groupVolts.${present}`);
    onLeave?.();
    paste.forget();
    if (group >= count) return onLast?.();
    setPresent(Math.max(0, group));
    input.current?.focus();
  };
  const key = (name: string) =>
    name === 'rub' ? put(value.slice(0, -1)) : put(name === marks.decimal && /[.,]/.test(value) ? value : value + name);
  const lastOne = present === count - 1;
  return (
    <View>
      <GroupStrip values={values} count={count} present={present} verdictOf={verdictOf} onGo={go} />
      <View style={styles.head}>
        <Txt kind="numM" nativeID="pad-group">{`G${present + 1}`}</Txt>
        <View ref={box} style={[styles.box, (error || verdict?.inside === false) && styles.bad]}>
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
            {...web({ 'aria-describedby': 'pad-says', 'aria-invalid': error !== undefined || undefined })}
            style={styles.input}
          />
          <Txt tone="ink2">V</Txt>
        </View>
      </View>
      <View style={styles.says} nativeID="pad-says">
        {error || verdict ? (
          <Txt kind="label" tone={error || !verdict?.inside ? 'alarm' : 'ready'}>
            {error ?? verdict?.text}
          </Txt>
        ) : null}
        {paste.refused ? <RefusedVolts volts={paste.refused.volts} /> : null}
      </View>
      <View style={styles.walk}>
        <Button
          look="line"
          size="small"
          title={present === 0 ? 'Back' : `Back to G${present}`}
          disabled={present === 0}
          onPress={() => go(present - 1)}
          grow
        />
        <Button
          look="line"
          size="small"
          title={value.trim() === '' ? `Skip G${present + 1}` : lastOne ? 'Done' : `On to G${present + 2}`}
          onPress={() => go(present + 1)}
          grow
        />
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
  head: { flexDirection: 'row', alignItems: 'center', columnGap: 12, marginTop: 12 },
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
  says: { minHeight: 24, justifyContent: 'center' },
  walk: { flexDirection: 'row', columnGap: touch.gap, marginBottom: touch.gap },
  keys: { flexDirection: 'row', flexWrap: 'wrap', gap: touch.gap },
  key: {
    height: touch.min,
    width: 'calc((100% - 16px) / 3)' as unknown as number,
    alignItems: 'center',
    justifyContent: 'center',
    borderRadius: radius.control,
    ...innerFrame(theme, stroke.control, theme.colors.edge),
  },
  pressed: { backgroundColor: theme.colors.well },
}));
