import { View } from 'react-native';
import { makeStyles } from '../theme/make-styles';
import { Txt } from './txt';

/** A count of alarms. Over 99 it says '99+'. Hidden from readers: the control it stands on says the count in its name. */
export function Badge({ count }: { count: number }) {
  const styles = useStyles();
  if (count <= 0) return null;
  return (
    <View style={styles.box} aria-hidden>
      <Txt kind="numXS" tone="onAlarm" align="center" style={styles.text}>
        {count > 99 ? '99+' : String(count)}
      </Txt>
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  box: { minWidth: 20, height: 20, borderRadius: 3, backgroundColor: colors.alarm, paddingHorizontal: 5 },
  text: { fontSize: 14, lineHeight: 20 },
}));
