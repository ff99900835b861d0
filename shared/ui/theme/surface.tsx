import { createContext, useContext, type ReactNode } from 'react';
import { View, type StyleProp, type ViewProps, type ViewStyle } from 'react-native';
import { useTheme } from './theme';
import type { ColorRole } from './tokens';

/** What a drawing can stand on. The halo of notch, now line and break marks takes this colour. */
export type SurfaceTone = Extract<ColorRole, 'ground' | 'sheet' | 'well' | 'checkDueTint' | 'alarmTint' | 'heldTint'>;

const SurfaceContext = createContext<SurfaceTone>('ground');

/** The tone of the nearest surface. */
export const useSurface = (): SurfaceTone => useContext(SurfaceContext);

/** The colour drawings use to cut themselves free from what lies under them. */
export const useHalo = (): string => useTheme().colors[useSurface()];

/** Says what its children stand on, without drawing anything. */
export const OnSurface = ({ tone, children }: { tone: SurfaceTone; children: ReactNode }) => (
  <SurfaceContext.Provider value={tone}>{children}</SurfaceContext.Provider>
);

/** A coloured ground that tells its drawings what it is. */
export function Surface({
  tone,
  style,
  children,
  ...rest
}: ViewProps & { tone: SurfaceTone; style?: StyleProp<ViewStyle> }) {
  const { colors } = useTheme();
  return (
    <View style={[{ backgroundColor: colors[tone] }, style]} {...rest}>
      <OnSurface tone={tone}>{children}</OnSurface>
    </View>
  );
}
