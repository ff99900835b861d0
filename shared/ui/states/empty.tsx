import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { Path, Svg } from 'react-native-svg';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { useHalo } from '../theme/surface';
import { useTheme } from '../theme/theme';
import type { IconName } from '../icons/icon-paths';

/** An empty vessel with its notch, 92 px wide: nothing is in it yet. */
export function EmptyVessel() {
  const { colors } = useTheme();
  const halo = useHalo();
  return (
    <Svg width={104} height={122} viewBox="0 0 104 122" fill="none" aria-hidden>
      <Path d="M6 8h92v108H6z" fill={colors.well} />
      <Path d="M6 8v108h92V8" stroke={colors.edge} strokeWidth={3} />
      <Path d="M0 44H92" stroke={halo} strokeWidth={9} />
      <Path d="M0 44H96" stroke={colors.ink} strokeWidth={3.5} />
      <Path d="M92 44l12 -8v16z" fill={colors.ink} />
    </Svg>
  );
}

/** Nothing there yet: one sentence and the one thing to do. */
export function Empty({
  sentence,
  action,
  children,
}: {
  /** 'No charges yet. Plan the first from a repair.' */
  sentence: string;
  action?: { title: string; onPress: () => void; icon?: IconName };
  children?: ReactNode;
}) {
  return (
    <View style={styles.box}>
      <View style={styles.row}>
        <EmptyVessel />
        <Txt kind="titleWide" style={styles.sentence}>
          {sentence}
        </Txt>
      </View>
      {action ? <Button title={action.title} icon={action.icon} onPress={action.onPress} /> : null}
      {children}
    </View>
  );
}

const styles = StyleSheet.create({
  box: { paddingTop: 40, rowGap: 26, maxWidth: 560 },
  row: { flexDirection: 'row', alignItems: 'flex-end', columnGap: 22 },
  sentence: { flex: 1, lineHeight: 37 },
});
