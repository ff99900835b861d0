/**
 * A browser's sound that starts silent, as before the first tap, and says of each tone which it is.
 * @param plays gets the pitch of each tone that is started, Hz
 * @param made gets every context, so that a test can put it back to silence
 */
export function audioContextThat(plays: (hertz: number) => void, made: Set<{ state: string }>) {
  return class {
    state = 'suspended';
    currentTime = 0;
    destination = {};
    constructor() {
      made.add(this);
    }
    resume = async () => void (this.state = 'running');
    createGain = () => ({
      gain: { setValueAtTime() {}, linearRampToValueAtTime() {} },
      connect: () => ({}),
    });
    createOscillator = () => {
      const frequency = { value: 0 };
      return { type: '', frequency, connect: (next: object) => next, start: () => plays(frequency.value), stop() {} };
    };
  };
}
