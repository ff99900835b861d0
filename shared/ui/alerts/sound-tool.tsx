import { IconButton } from '../primitives/icon-button';

export type SoundState = 'on' | 'off' | 'muted' | 'none';

/** Whether alerts are heard on this device, and the tap that changes it; nothing where the device has no sound. */
export function SoundTool({
  state,
  onArm,
  onSwitch,
}: {
  state: SoundState;
  /** The browser waits for a tap before it plays anything. */
  onArm: () => void;
  onSwitch: (on: boolean) => void;
}) {
  switch (state) {
    case 'none':
      return null;
    case 'muted':
      return <IconButton icon="muted" label="The sound is muted. Tap to hear alerts" onPress={onArm} />;
    case 'off':
      return <IconButton icon="muted" label="The sound is off. Switch it on" onPress={() => onSwitch(true)} />;
    case 'on':
      return <IconButton icon="sound" label="The sound is on. Switch it off" onPress={() => onSwitch(false)} />;
  }
}

/** 'sound on', for the line under a title. */
export const soundWords: Record<SoundState, string> = {
  on: 'sound on',
  off: 'sound off',
  muted: 'sound muted',
  none: 'no sound on this device',
};
