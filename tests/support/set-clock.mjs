// Loaded into a server before anything else: its clock goes ahead of the machine's by what the test says, ms.
import { ServerResponse } from 'node:http';

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

// Node writes the Date header from a Date of its own, and the pages take their first sight of the time from it.
const { writeHead } = ServerResponse.prototype;
ServerResponse.prototype.writeHead = function (...parts) {
  if (!this.headersSent && !this.hasHeader('date')) this.setHeader('date', new SetDate().toUTCString());
  return writeHead.apply(this, parts);
};
process.on('message', (message) => {
  aheadMs = message.clockAheadMs ?? aheadMs;
});
