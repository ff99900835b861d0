import { useController, type FieldPath, type FieldValues } from 'react-hook-form';
import { View } from 'react-native';
import type { TypedForm } from '../forms/bound';
import { CheckBox } from '../primitives/check-box';
import { TimeField } from '../primitives/time-field';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { weekDays, type HourTexts } from './settings-form';

type Days = HourTexts['workingHours'];
interface Wrong {
  message?: string;
  [day: number]: { from?: { message?: string }; to?: { message?: string } } | undefined;
}

const usual = { from: '08:00', to: '17:00' };

/** Seven days, Monday first: from and to, or none at all. */
export function HoursFields<V extends FieldValues>({
  form,
  name,
  off = 'closed',
}: {
  form: TypedForm<V>;
  /** Where the seven days stand in the form. */
  name: FieldPath<V>;
  /** What a day without hours is called. */
  off?: string;
}) {
  const styles = useStyles();
  const { field, fieldState } = useController<V>({ control: form.control as never, name });
  const days = field.value as Days;
  const wrong = fieldState.error as Wrong | undefined;
  const change = (index: number, day: Days[number]) =>
    field.onChange(days.map((present, i) => (i === index ? day : present)));
  return (
    <View>
      {weekDays.map((title, index) => {
        const day = days[index] ?? null;
        const error = (side: 'from' | 'to') => wrong?.[index]?.[side]?.message;
        return (
          <View key={title} role="group" aria-label={title} style={styles.day}>
            <View style={styles.name}>
              <CheckBox
                checked={day !== null}
                onChange={(open) => change(index, open ? usual : null)}
                title={title}
                meaning={day === null ? off : undefined}
              />
            </View>
            {day === null ? null : (
              <View style={styles.times}>
                {(['from', 'to'] as const).map((side) => (
                  <View key={side} style={styles.time}>
                    <TimeField
                      label={side === 'from' ? 'From' : 'To'}
                      size="low"
                      value={day[side]}
                      error={error(side)}
                      onChangeText={(text) => change(index, { ...day, [side]: text })}
                      onBlur={field.onBlur}
                      ref={side === 'to' && error('to') !== undefined ? field.ref : undefined}
                    />
                  </View>
                ))}
              </View>
            )}
          </View>
        );
      })}
      {wrong && !Array.isArray(wrong) && wrong.message ? <Txt tone="alarm">{wrong.message}</Txt> : null}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  day: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'center',
    columnGap: 16,
    borderTopWidth: 1,
    borderTopColor: colors.line,
    paddingVertical: 6,
  },
  name: { width: 140 },
  times: { flexDirection: 'row', flexGrow: 1, flexBasis: 220, columnGap: 12 },
  time: { flex: 1, minWidth: 0 },
}));
