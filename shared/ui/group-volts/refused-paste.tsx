import { Txt } from '../primitives/txt';

/** What was pasted and not taken, so that it can be compared and typed. */
export function RefusedVolts({ volts }: { volts: readonly string[] }) {
  return <Txt kind="label" role="alert">{`Pasted, not taken: ${volts.join('; ')}`}</Txt>;
}
