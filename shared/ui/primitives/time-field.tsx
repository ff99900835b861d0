import { View } from 'react-native';
import { Icon } from '../icons/icon';
import { nearestQuarter, quarterHours } from '../format/choices';
import { parseTimeOfDay, timeOfDayText } from '../format/parse';
import { makeStyles } from '../theme/make-styles';
import { touch } from '../theme/tokens';
import { domElement } from './dom-element';
import { Field, type FieldProps } from './field';

/**
 * A time of day: typed ('1815', '18:15') or picked in quarter hours from the browser's own list. The text stays as
 * typed until the field is left; then a time that was understood is written out as '18:15'.
 */
export function TimeField({
  value,
  onChangeText,
  onBlur,
  readOnly,
  ...field
}: Omit<FieldProps, 'kind' | 'suffix' | 'multiline' | 'lines'>) {
  const styles = useStyles();
  return (
    <Field
      {...field}
      kind="whole"
      value={value}
      readOnly={readOnly}
      onChangeText={onChangeText}
      onBlur={() => {
        const minutes = parseTimeOfDay(value);
        const text = minutes === null ? value : timeOfDayText(minutes);
        if (text !== value) onChangeText(text);
        onBlur?.();
      }}
      suffix={
        readOnly ? null : (
          <View style={styles.pick}>
            <Icon name="time" size={22} tone="ink2" />
            {domElement('select', {
              'aria-label': `${field.label}, pick in quarter hours`,
              value: nearestQuarter(value),
              onChange: (event: { target: { value: string } }) => onChangeText(event.target.value),
              style: styles.list,
              children: quarterHours.map((time) => domElement('option', { key: time, value: time, children: time })),
            })}
          </View>
        )
      }
    />
  );
}

const useStyles = makeStyles(({ colors }) => ({
  pick: {
    width: touch.min,
    height: touch.min,
    marginRight: -12,
    alignItems: 'center',
    justifyContent: 'center',
  },
  // The list lies invisibly over its icon: the whole 48 px open it, and the keyboard reaches it.
  list: {
    position: 'absolute',
    top: 0,
    left: 0,
    width: '100%',
    height: '100%',
    opacity: 0,
    color: colors.ink,
    backgroundColor: colors.sheet,
    cursor: 'pointer',
  } as object,
}));
