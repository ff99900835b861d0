/** Sound of the alerts where the platform has no Web Audio: none. The web has its own file beside this one. */
import { externalStore, useStore } from './external-store';
import type { SoundName } from './sound-contours';

/** off: a person switched it off. muted: the browser waits for a tap. none: no sound on this device. */
export type SoundState = 'on' | 'off' | 'muted' | 'none';

const store = externalStore<SoundState>('none');
export const useSoundState = (): SoundState => useStore(store);
export const armSound = async (): Promise<SoundState> => 'none';
export const switchSound = (_on: boolean): void => {};
/** False while the browser waits for a tap before it plays: what rings now is not heard. */
export const canRing = (): boolean => true;
export const playSound = (_name: SoundName): void => {};
/** Watches for the tap that lets the browser play. @returns stops */
export const keepSound = (): (() => void) => () => {};
