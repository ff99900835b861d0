import type { ViewStyle } from 'react-native';

/** What the web renderer takes and React Native's types do not know. */
export interface WebOnlyProps {
  'aria-colspan'?: number;
  'aria-controls'?: string;
  'aria-current'?: 'page' | 'step' | 'true';
  'aria-describedby'?: string;
  'aria-errormessage'?: string;
  'aria-haspopup'?: 'dialog' | 'listbox' | 'menu';
  'aria-invalid'?: boolean;
  'aria-label'?: string;
  'aria-labelledby'?: string;
  'aria-level'?: number;
  'aria-live'?: 'assertive' | 'polite' | 'off';
  'aria-pressed'?: boolean;
  'aria-readonly'?: boolean;
  'aria-required'?: boolean;
  'aria-roledescription'?: string;
  'aria-rowcount'?: number;
  'aria-sort'?: 'ascending' | 'descending' | 'none';
  dataSet?: Record<string, string>;
  href?: string;
  hrefAttrs?: { download?: string | boolean; rel?: string; target?: string };
  inert?: boolean;
  lang?: string;
  onBlur?: (event: unknown) => void;
  onClick?: (event: { preventDefault(): void; stopPropagation(): void }) => void;
  onFocus?: (event: unknown) => void;
  onKeyDown?: (event: WebKeyEvent) => void;
  role?: string;
  spellCheck?: boolean;
  tabIndex?: 0 | -1;
}

export interface WebKeyEvent {
  key: string;
  shiftKey: boolean;
  altKey: boolean;
  ctrlKey: boolean;
  metaKey: boolean;
  target: unknown;
  currentTarget: unknown;
  preventDefault(): void;
  stopPropagation(): void;
}

/** Spread into a primitive: `<View {...web({ 'aria-describedby': id })} />`. */
export const web = (props: WebOnlyProps): object => props;

/** A style only the web renderer understands (transitions, fixed places, outlines). */
export const webStyle = (style: Record<string, unknown>): ViewStyle => style as ViewStyle;
