import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';

/** Fields of a form under each other, 12 px apart. */
export const FormStack = ({ children }: { children: ReactNode }) => <View style={styles.stack}>{children}</View>;

const styles = StyleSheet.create({ stack: { rowGap: 12, paddingTop: 2, paddingBottom: 8 } });
