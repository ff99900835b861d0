// Loaded into a server before anything else: its clock goes ahead of the machine's by what the test says, ms.
const RealDate = Date;
let aheadMs = Number(process.env.CLOCK_AHEAD_MS ?? 0);

class SetDate extends RealDate {
  constructor(...parts) {
    // A date without parts is now; all others are what they say.
    if (parts.length === 0) super(SetDate.now());
    else super(...parts);
  }
  static now() {
    return RealDate.now() + aheadMs;
  }
}
globalThis.Date = SetDate;
process.on('message', (message) => {
  aheadMs = message.clockAheadMs ?? aheadMs;
});
