import { useController } from 'react-hook-form';
import { View } from 'react-native';
import { Field } from '../primitives/field';
import type { FieldVerdict } from '../primitives/field-frame';
import { makeStyles } from '../theme/make-styles';
import type { GroupForm } from './group-form';
import { RefusedVolts } from './refused-paste';
import { useGroupPaste } from './use-group-paste';
import { usePastedVolts } from './use-pasted-volts';

export interface GroupEntryProps {
  form: GroupForm;
  count: number;
  /** What the numbers say of a group as typed; null: nothing yet. */
  verdictOf?: (group: number) => FieldVerdict | null;
  /** A group was left: the moment to look at what is odd. */
  onLeave?: () => void;
  /** After the last group. */
  onLast?: () => void;
}

/** The groups as fields, side by side as far as there is room. Next walks them; the last one closes the keyboard. */
export function GroupFields({
  columns,
  ...entry
}: GroupEntryProps & {
  /** Fields in a row. */
  columns: number;
}) {
  const styles = useStyles();
  const { refused, put, forget } = useGroupPaste(entry.form, entry.count);
  return (
    <View style={styles.whole}>
      <View style={styles.grid}>
        {Array.from({ length: entry.count }, (_, group) => (
          <View key={group} style={{ width: `${100 / columns}%`, paddingHorizontal: 4 }}>
            <GroupField
              {...entry}
              group={group}
              refused={refused?.group === group ? refused.sentence : null}
              onPaste={(volts) => void put(group, volts)}
              onTyped={forget}
            />
          </View>
        ))}
      </View>
      {refused ? <RefusedVolts volts={refused.volts} /> : null}
    </View>
  );
}

function GroupField({
  form,
  count,
  group,
  verdictOf,
  onLeave,
  onLast,
  refused,
  onPaste,
  onTyped,
}: GroupEntryProps & {
  group: number;
  /** Why the list that was pasted here was not taken. */
  refused: string | null;
  onPaste: (volts: string[]) => void;
  onTyped: () => void;
}) {
  const {
    field: { ref, value, onChange, onBlur },
    fieldState,
  } = useController({ control: form.control, name: `groupVolts.${group}` });
  const last = group === count - 1;
  const next = () => {
    if (!last) return form.setFocus(`groupVolts.${group + 1}`);
    onLast?.();
  };
  const box = usePastedVolts(onPaste);
  const error = refused ?? fieldState.error?.message;
  return (
    <View ref={box}>
      <Field
        label={`Group ${group + 1}`}
        kind="decimal"
        unit="V"
        value={value ?? ''}
        onChangeText={(text) => {
          onTyped();
          onChange(text);
        }}
        onBlur={() => {
          onBlur();
          onLeave?.();
        }}
        ref={ref}
        error={error}
        verdict={error ? undefined : (verdictOf?.(group) ?? undefined)}
        onSubmit={next}
        nextKey={last ? 'done' : 'next'}
      />
    </View>
  );
}

const useStyles = makeStyles(() => ({
  whole: { rowGap: 8 },
  grid: { flexDirection: 'row', flexWrap: 'wrap', rowGap: 14, marginHorizontal: -4 },
}));
