import type { Theme } from './theme';
import { faceStacks, motion } from './tokens';
import { useMediaQuery } from './use-media-query';

const sheetId = 'bw-page';

/**
 * What React Native styles cannot say: the focus ring of everything that takes the keyboard, tabular numerals in
 * drawings, the notches of phones outside the margins, the system's colours by name. Where the system forces its colours the theme already speaks in them, so
 * that the browser need not repaint. `:where` keeps it weaker than any style of a component.
 */
const rules = `
:root{--bw-canvas:Canvas;--bw-canvas-text:CanvasText;--bw-highlight:Highlight;--bw-gray:GrayText}
body{box-sizing:border-box;padding:env(safe-area-inset-top) env(safe-area-inset-right) env(safe-area-inset-bottom) env(safe-area-inset-left)}
html{font-variant-numeric:tabular-nums;font-family:${faceStacks.text};-webkit-text-size-adjust:100%;text-size-adjust:100%}
:where(:focus-visible){outline:3px solid var(--bw-focus);outline-offset:-3px}
:where([data-focus="none"]):focus-visible,:where(input,select,textarea):focus-visible{outline:none}
:where([data-press]){transition:background-color ${motion.press}ms ${motion.ease},border-color ${motion.press}ms ${motion.ease}}
@media (forced-colors:active){*{forced-color-adjust:none}}
@media (prefers-reduced-motion:reduce){*,*::before,*::after{transition-duration:0ms!important;animation-duration:0ms!important}}
`;

const hasPage = typeof document !== 'undefined';

interface Layer {
  depth: number;
  theme: Theme;
}
const layers = new Set<Layer>();

/**
 * Writes a theme into the page around the components: ground, focus colour, the browser's own bars. The innermost
 * provider wins while it is there (the wall inside the app). Returns how to take it away again.
 */
export function applyPageTheme(theme: Theme, depth: number): () => void {
  const layer = { depth, theme };
  layers.add(layer);
  write();
  return () => {
    layers.delete(layer);
    write();
  };
}

function write(): void {
  const innermost = [...layers].sort((a, b) => b.depth - a.depth)[0];
  if (!hasPage || !innermost) return;
  const { theme } = innermost;
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
