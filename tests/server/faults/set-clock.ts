/** Loaded into a server before anything else: its clock goes ahead of the machine's by what the test says. */
const RealDate = Date;
let aheadMs = Number(process.env.CLOCK_AHEAD_MS ?? 0);

class SetDate extends RealDate {
  constructor(...parts: unknown[]) {
    // A date without parts is now; all others are what they say.
    if (parts.length === 0) super(SetDate.now());
    else super(...(parts as [number]));
  }
  static override now(): number {
    return RealDate.now() + aheadMs;
  }
}
globalThis.Date = SetDate as DateConstructor;
process.on('message', (message) => {
  aheadMs = (message as { clockAheadMs?: number }).clockAheadMs ?? aheadMs;
});
