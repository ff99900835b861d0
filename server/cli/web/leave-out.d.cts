/** Exports of React Native Web that its index does not gather. */
export const leftOutOfIndex: string[];
