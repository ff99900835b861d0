import { StyleSheet, type ImageStyle, type TextStyle, type ViewStyle } from 'react-native';
import { useTheme, type Theme } from './theme';

type NamedStyles<T> = { [P in keyof T]: ViewStyle | TextStyle | ImageStyle };

/**
 * A hook for styles that depend on the theme. The sheet is made once per theme, not once per component.
 *
 * @example const useStyles = makeStyles(({ colors }) => ({ box: { backgroundColor: colors.sheet } }));
 */
export function makeStyles<T extends NamedStyles<T>>(make: (theme: Theme) => T & NamedStyles<T>): () => T {
  const made = new WeakMap<Theme, T>();
  return function useStyles() {
    const theme = useTheme();
    let styles = made.get(theme);
    if (!styles) {
      styles = StyleSheet.create(make(theme));
      made.set(theme, styles);
    }
    return styles;
  };
}
