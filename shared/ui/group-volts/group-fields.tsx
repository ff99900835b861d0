import { useController } from 'react-hook-form';
import { View } from 'react-native';
import { Field } from '../primitives/field';
import type { FieldVerdict } from '../primitives/field-frame';
import { makeStyles } from '../theme/make-styles';
import { spreadVolts, type GroupForm } from './group-form';
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
  return (
    <View style={styles.grid}>
      {Array.from({ length: entry.count }, (_, group) => (
        <View key={group} style={{ width: `${100 / columns}%`, paddingHorizontal: 4 }}>
          <GroupField {...entry} group={group} />
        </View>
      ))}
    </View>
  );
}

function GroupField({ form, count, group, verdictOf, onLeave, onLast }: GroupEntryProps & { group: number }) {
  const {
    field: { ref, value, onChange, onBlur },
    fieldState,
  } = useController({ control: form.control, name: `groupVolts.${group}` });
  const last = group === count - 1;
  const next = () => {
    if (!last) return form.setFocus(`groupVolts.${group + 1}`);
    onLast?.();
  };
  const box = usePastedVolts((many) => spreadVolts(form, group, count, many));
  return (
    <View ref={box}>
      <Field
        label={`Group ${group + 1}`}
        kind="decimal"
        unit="V"
        value={value ?? ''}
        onChangeText={onChange}
        onBlur={() => {
          onBlur();
          onLeave?.();
        }}
        ref={ref}
        error={fieldState.error?.message}
        verdict={fieldState.error ? undefined : (verdictOf?.(group) ?? undefined)}
        onSubmit={next}
        nextKey={last ? 'done' : 'next'}
      />
    </View>
  );
}

const useStyles = makeStyles(() => ({
  grid: { flexDirection: 'row', flexWrap: 'wrap', rowGap: 14, marginHorizontal: -4 },
}));
