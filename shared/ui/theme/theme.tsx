import { createContext, useContext, useLayoutEffect, useMemo, type ReactNode } from 'react';
import { useColorScheme } from 'react-native';
import { applyPageTheme, useForcedColors } from './page-theme';
import { palettes, type ColorRole, type Palette, type ThemeName } from './tokens';

export interface Theme {
  name: ThemeName;
  colors: Palette;
  /** The system replaces colours by its own (high contrast): only shape, word and edge tell. */
  forced: boolean;
}

const paper: Theme = { name: 'paper', colors: palettes.paper, forced: false };
const night: Theme = { name: 'night', colors: palettes.night, forced: false };

const system = (name: ThemeName): Theme => {
  const back: readonly ColorRole[] = ['ground', 'sheet', 'well', 'onInk', 'onStage', 'onCheckDue', 'onAlarm'];
  const of = (role: ColorRole) =>
    role === 'focus'
      ? 'var(--bw-highlight)'
      : back.includes(role) || role.endsWith('Tint')
        ? 'var(--bw-canvas)'
        : 'var(--bw-canvas-text)';
  const roles = Object.keys(palettes.paper) as ColorRole[];
  return {
    name,
    forced: true,
    colors: Object.fromEntries(roles.map((role) => [role, of(role)])) as unknown as Palette,
  };
};
const forcedThemes: Record<ThemeName, Theme> = { paper: system('paper'), night: system('night') };

const ThemeContext = createContext<Theme>(paper);
const DepthContext = createContext(0);

/**
 * Gives the theme to what is inside.
 *
 * @param choice 'system' follows the device; 'paper' and 'night' are chosen by a person; the wall always takes 'night'.
 */
export function ThemeProvider({ choice = 'system', children }: { choice?: ThemeName | 'system'; children: ReactNode }) {
  const scheme = useColorScheme();
  const forced = useForcedColors();
  const name: ThemeName = choice === 'system' ? (scheme === 'dark' ? 'night' : 'paper') : choice;
  const theme = useMemo(() => (forced ? forcedThemes[name] : name === 'night' ? night : paper), [forced, name]);
  const depth = useContext(DepthContext);
  // Before the first paint, or the page would flash in the other theme.
  useLayoutEffect(() => applyPageTheme(theme, depth), [theme, depth]);
  return (
    <DepthContext.Provider value={depth + 1}>
      <ThemeContext.Provider value={theme}>{children}</ThemeContext.Provider>
    </DepthContext.Provider>
  );
}

/** The theme in force: colours by role. */
export const useTheme = (): Theme => useContext(ThemeContext);
