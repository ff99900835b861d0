/** What a browser refuses over plain http, and how the screens say so. */
export type Feature = 'wake-lock' | 'notifications' | 'camera' | 'service-worker';

export interface MissingFeature {
  feature: Feature;
  sentence: string;
}

const overHttp: Record<Feature, string> = {
  'wake-lock': 'This screen may fall asleep: a browser keeps it awake only over https.',
  notifications: 'Notices outside this page are off: a browser shows them only over https.',
  camera:
    'The camera is off in this page: a browser opens it only over https. Type the code, or scan it with the device’s own camera app.',
  'service-worker': 'Opening without a connection is off: a browser keeps the app only over https.',
};
const notHere: Record<Feature, string> = {
  'wake-lock':
    'This screen may fall asleep: this browser cannot keep it awake. Switch the sleep timer off in the device.',
  notifications: 'Notices outside this page are off: this browser has none.',
  camera:
    'The camera is off in this page: this browser opens none. Type the code, or scan it with the device’s own camera app.',
  'service-worker': 'Opening without a connection is off: this browser cannot keep the app.',
};

export interface Surroundings {
  secure: boolean;
  has: Record<Feature, boolean>;
}

/** What this browser offers at this address. */
export function surroundings(): Surroundings {
  const nav = globalThis.navigator as Partial<Navigator> | undefined;
  return {
    secure: globalThis.isSecureContext === true,
    has: {
      'wake-lock': Boolean(nav && 'wakeLock' in nav),
      notifications: 'Notification' in globalThis,
      camera: Boolean(nav?.mediaDevices),
      'service-worker': Boolean(nav && 'serviceWorker' in nav),
    },
  };
}

/** Which of them are off here, each with its sentence; empty where all are there. */
export function missingHere(
  features: readonly Feature[],
  { secure, has }: Surroundings = surroundings(),
): MissingFeature[] {
  return features
    .filter((feature) => !secure || !has[feature])
    .map((feature) => ({ feature, sentence: secure ? notHere[feature] : overHttp[feature] }));
}
