import type { ReactNode } from 'react';
import { View } from 'react-native';
import { useBreakpoint } from '../theme/use-breakpoint';

/** The form at the left, the picture of its curve beside it: it needs the wider half. Under each other elsewhere. */
export function TypeColumns({ form, picture }: { form: ReactNode; picture: ReactNode }) {
  if (useBreakpoint() !== 'wide')
    return (
      <View style={{ rowGap: 24 }}>
        {form}
        {picture}
      </View>
    );
  return (
    <View style={{ flexDirection: 'row', columnGap: 40, alignItems: 'flex-start' }}>
      <View style={{ width: 540, flexShrink: 0 }}>{form}</View>
      <View style={{ flex: 1, minWidth: 0, maxWidth: 960 }}>{picture}</View>
    </View>
  );
}
