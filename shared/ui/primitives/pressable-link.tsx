import type { ReactNode } from 'react';
import { Pressable, type GestureResponderEvent, type StyleProp, type ViewStyle } from 'react-native';
import { web } from '../theme/web-props';

/** The part of a click that says where a person wants to go; the web renderer hands the browser's own event on. */
interface Click {
  preventDefault(): void;
  metaKey?: boolean;
  ctrlKey?: boolean;
  shiftKey?: boolean;
}

/**
 * The press of something with an address: goes inside the app, and with Ctrl, Shift or the command key leaves it to the
 * browser, which opens a tab of its own. For `onPress`: the renderer replaces an `onClick`.
 */
export const goInside =
  (go: () => void) =>
  (event: GestureResponderEvent): void => {
    const click = event as unknown as Click;
    if (click.metaKey || click.ctrlKey || click.shiftKey) return;
    click.preventDefault();
    go();
  };

/** A real link with React Native contents: can be copied, opened in a tab, and goes inside the app on a plain press. */
export function PressableLink({
  href,
  onGo,
  label,
  current = false,
  style,
  children,
}: {
  href: string;
  onGo: () => void;
  label?: string;
  /** It is the page that is shown. */
  current?: boolean;
  style?: StyleProp<ViewStyle> | ((state: { pressed: boolean }) => StyleProp<ViewStyle>);
  children: ReactNode;
}) {
  return (
    <Pressable
      role="link"
      aria-label={label}
      onPress={goInside(onGo)}
      {...web({ href, 'aria-current': current ? 'page' : undefined, dataSet: { press: '' } })}
      style={style}
    >
      {children}
    </Pressable>
  );
}
