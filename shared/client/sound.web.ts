/** The alerts' sounds by Web Audio, and the same pattern as vibration for a silent phone. No sound file is loaded. */
import { externalStore, useStore } from './external-store';
import { prefer, preferencesNow } from './preferences';
import { contours, vibrationOf, type SoundName } from './sound-contours';

/** off: a person switched it off. muted: the browser waits for a tap. none: no sound on this device. */
export type SoundState = 'on' | 'off' | 'muted' | 'none';

let context: AudioContext | null = null;
const store = externalStore<SoundState>('muted');

function stateNow(): SoundState {
  if (typeof AudioContext === 'undefined') return 'none';
  if (!preferencesNow().sound) return 'off';
  return context?.state === 'running' ? 'on' : 'muted';
}
const renew = () => store.set(stateNow());

export const useSoundState = (): SoundState => useStore(store);

/** Makes the browser play; call it from a tap. */
export async function armSound(): Promise<SoundState> {
  if (typeof AudioContext !== 'undefined' && preferencesNow().sound) {
    if (!context) {
      context = new AudioContext();
      context.onstatechange = renew;
    }
    try {
      await context.resume();
    } catch {
      // Stays muted; the header says so.
    }
  }
  renew();
  return store.get();
}

/** A person's choice for this device. Switching on plays nothing by itself. */
export function switchSound(on: boolean): void {
  prefer({ sound: on });
  if (on) void armSound();
  renew();
}

/** False while the browser waits for a tap before it plays: what rings now is not heard. */
export const canRing = (): boolean => stateNow() !== 'muted';

/** Plays a contour now, and the same as vibration. A muted or switched-off device only vibrates. */
export function playSound(name: SoundName): void {
  const tones = contours[name];
  try {
    // Before the first tap a browser refuses it, and says so in its console; some throw instead of answering false.
    if (navigator.userActivation?.hasBeenActive !== false) navigator.vibrate?.(vibrationOf(tones));
  } catch {
    // The sound is the other way.
  }
  if (!context || context.state !== 'running' || !preferencesNow().sound) return;
  let at = context.currentTime + 0.02;
  for (const { hertz, ms, gapMs = 0 } of tones) {
    const end = at + ms / 1000;
    const tone = context.createOscillator();
    const volume = context.createGain();
    // A triangle carries through a workshop better than a sine, and does not rasp like a square.
    tone.type = 'triangle';
    tone.frequency.value = hertz;
    volume.gain.setValueAtTime(0, at);
    volume.gain.linearRampToValueAtTime(0.8, at + 0.012);
    volume.gain.setValueAtTime(0.8, Math.max(at + 0.012, end - 0.04));
    volume.gain.linearRampToValueAtTime(0, end);
    tone.connect(volume).connect(context.destination);
    tone.start(at);
    tone.stop(end);
    at = end + gapMs / 1000;
  }
}

/** Watches for the tap that lets the browser play. @returns stops */
export function keepSound(): () => void {
  const tapped = () => void armSound();
  const events = ['pointerdown', 'keydown'] as const;
  events.forEach((event) => document.addEventListener(event, tapped, { capture: true, passive: true }));
  renew();
  return () => events.forEach((event) => document.removeEventListener(event, tapped, { capture: true }));
}
