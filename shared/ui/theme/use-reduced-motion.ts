import { useMediaQuery } from './use-media-query';

/** True where a person asked for less motion, or where the device cannot say: then nothing moves. */
export const useReducedMotion = (): boolean => useMediaQuery('(prefers-reduced-motion: reduce)', true);
