import { useWindowDimensions } from 'react-native';
import { breakpoints } from './tokens';

export type Breakpoint = 'phone' | 'tablet' | 'wide';

/** The layout a window of this width gets: phone to 719 px, tablet to 1079, wide from 1080. */
export const breakpointOf = (width: number): Breakpoint =>
  width >= breakpoints.wide ? 'wide' : width >= breakpoints.tablet ? 'tablet' : 'phone';

/** The layout in force. Twice the text size halves the width in CSS pixels, so a zoomed desk drops to the phone's. */
export const useBreakpoint = (): Breakpoint => breakpointOf(useWindowDimensions().width);
