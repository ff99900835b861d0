import type { ReactNode } from 'react';
import { View } from 'react-native';

/** What is asked in a sheet, as far apart as the fields of a form. `under` a sentence it keeps its distance from that too. */
export const SheetFields = ({ under = false, children }: { under?: boolean; children: ReactNode }) => (
  <View style={{ rowGap: 14, marginTop: under ? 14 : 0 }}>{children}</View>
);
