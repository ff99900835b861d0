import type { Theme } from './theme';
import { faceStacks, motion } from './tokens';
import { useMediaQuery } from './use-media-query';

const sheetId = 'bw-page';

/**
 * What React Native styles cannot say: the focus ring of everything that takes the keyboard, tabular numerals in
 * drawings, the system's colours by name. Where the system forces its colours the theme already speaks in them, so
 * that the browser need not repaint. `:where` keeps it weaker than any style of a component.
 */
const rules = `
:root{--bw-canvas:Canvas;--bw-canvas-text:CanvasText;--bw-highlight:Highlight;--bw-gray:GrayText}
html{font-variant-numeric:tabular-nums;font-family:${faceStacks.text};-webkit-text-size-adjust:100%;text-size-adjust:100%}
:where(:focus-visible){outline:3px solid var(--bw-focus);outline-offset:-3px}
:where([data-focus="none"]):focus-visible,:where(input,select,textarea):focus-visible{outline:none}
:where([data-press]){transition:background-color ${motion.press}ms ${motion.ease},border-color ${motion.press}ms ${motion.ease}}
@media (forced-colors:active){*{forced-color-adjust:none}}
@media (prefers-reduced-motion:reduce){*,*::before,*::after{transition-duration:0ms!important;animation-duration:0ms!important}}
`;

const hasPage = typeof document !== 'undefined';

/** Writes the theme into the page around the components: ground, focus colour, the browser's own bars. */
export function applyPageTheme(theme: Theme): void {
  if (!hasPage) return;
  let sheet = document.getElementById(sheetId);
  if (!sheet) {
    sheet = document.createElement('style');
    sheet.id = sheetId;
    sheet.textContent = rules;
    document.head.append(sheet);
  }
  const root = document.documentElement;
  root.style.setProperty('--bw-focus', theme.colors.focus);
  root.style.colorScheme = theme.name === 'night' ? 'dark' : 'light';
  root.style.backgroundColor = theme.colors.ground;
  document.body.style.backgroundColor = theme.colors.ground;
  document.querySelector('meta[name="theme-color"]')?.setAttribute('content', theme.colors.ground);
}

/** True while the system replaces the page's colours by its own. */
export const useForcedColors = (): boolean => useMediaQuery('(forced-colors: active)', false);
