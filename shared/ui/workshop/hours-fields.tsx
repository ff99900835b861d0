import { useController } from 'react-hook-form';
import { View } from 'react-native';
import { CheckBox } from '../primitives/check-box';
import { TimeField } from '../primitives/time-field';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import type { TypedForm } from '../forms/bound';
import { weekDays, type HourTexts } from './settings-form';

const usual = { from: '08:00', to: '17:00' };

/** Seven days, Monday first: open from and to, or closed. */
export function HoursFields({ form }: { form: TypedForm<HourTexts> }) {
  const styles = useStyles();
  const { field, formState } = useController({ control: form.control, name: 'workingHours' });
  const wrong = formState.errors.workingHours;
  const change = (index: number, day: HourTexts['workingHours'][number]) =>
    field.onChange(field.value.map((present, i) => (i === index ? day : present)));
  return (
    <View>
      {weekDays.map((name, index) => {
        const day = field.value[index] ?? null;
        const error = (side: 'from' | 'to') => wrong?.[index]?.[side]?.message;
        return (
          <View key={name} role="group" aria-label={name} style={styles.day}>
            <View style={styles.name}>
              <CheckBox
                checked={day !== null}
                onChange={(open) => change(index, open ? usual : null)}
                title={name}
                meaning={day === null ? 'closed' : undefined}
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
