import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';

/** Fields of a form under each other, 12 px apart. */
export const FormStack = ({ children }: { children: ReactNode }) => <View style={styles.stack}>{children}</View>;

/** Two short fields side by side. */
export const FieldPair = ({ children }: { children: [ReactNode, ReactNode] }) => (
  <View style={styles.pair}>
    <View style={styles.half}>{children[0]}</View>
    <View style={styles.half}>{children[1]}</View>
  </View>
);

const styles = StyleSheet.create({
  stack: { rowGap: 12, paddingTop: 2, paddingBottom: 8 },
  pair: { flexDirection: 'row', columnGap: 12 },
  half: { flex: 1, minWidth: 0 },
});
