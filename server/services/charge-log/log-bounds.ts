import type { ChargeFile } from '../charge-file';
import { ampsText, celsiusText, cellText, clipText } from '../charge-words';
import { MOST_TIMES_PLANNED, SUPPLY_SLACK, UNDER_CURRENT_OVER_LIMIT_VOLTS } from '../reading-bounds';

/** What a line holds, in the core's units and signs. */
export interface LogValues {
  terminalVolts: number | null;
  amps: number | null;
  celsius: number | null;
  groupVolts: number[] | null;
}

/** As for a typed reading. */
const MOST_CELSIUS = 120;
const LEAST_CELSIUS = -40;
/** A meter's zero, as a share of the planned amps and at least in A: so much the other way is none. */
const ZERO_SHARE = 0.02;
const ZERO_AMPS = 0.05;

/**
 * Which numbers can be this charge's: the same bounds as for a reading that is typed, over all steps of its plan, since a log
 * runs through them. An odd number within them is kept; only what cannot be is refused.
 * @returns a check that gives the values with the sign of the core, or the words why not
 */
export function logBounds(file: ChargeFile): (values: LogValues) => LogValues | string {
  const { charge, channels } = file;
  const { module } = charge.frozen;
  const { steps } = charge.option;
  const groups = steps.some(({ way }) => way === 'terminals') ? module.groupsInSeries : 1;
  const mostGroupVolts = module.chargeLimitVolts + UNDER_CURRENT_OVER_LIMIT_VOLTS;
  const mostVolts = groups * mostGroupVolts;
  const supplies = steps.flatMap(({ channelIds }) => channelIds.map((id) => channels.get(id)?.maxVolts ?? Infinity));
  const supplyVolts = supplies.length === 0 ? Infinity : Math.max(...supplies) * SUPPLY_SLACK;
  const planned = Math.max(Math.abs(charge.option.amps), ...steps.map(({ setAmps }) => Math.abs(setAmps ?? 0)));
  const mostAmps = planned > 0 ? planned * MOST_TIMES_PLANNED : 2000;
  const zero = Math.max(ZERO_AMPS, planned * ZERO_SHARE);
  const directions = new Set(steps.map(({ direction }) => direction ?? charge.direction));
  const both = directions.size > 1;
  const out = directions.has('discharge');

  const ampsOf = (amps: number): number | string => {
    const size = Math.abs(amps);
    if (size > mostAmps)
      return `Over twice the planned ${ampsText(planned)}, as ${ampsText(size)} is. Look at the unit of the amps.`;
    if (both) return amps;
    if (out) return size === 0 ? 0 : -size;
    if (amps >= 0) return amps;
    if (size <= zero) return 0;
    return `Amps out of the module, as −${ampsText(size)} is, while it is charged. Where the log counts it so, choose “into the module −”.`;
  };
  const problem = ({ terminalVolts, celsius, groupVolts }: LogValues): string | null => {
    if (terminalVolts !== null && terminalVolts < 0)
      return 'Volts below 0: the leads were reversed, or it is another column.';
    if (terminalVolts !== null && terminalVolts > mostVolts)
      return `More volts than ${groups === 1 ? 'one group shows' : `${groups} groups show`}, as ${clipText(terminalVolts)} is. Look at the unit and the column.`;
    if (terminalVolts !== null && terminalVolts > supplyVolts)
      return `More volts than the channel gives, as ${clipText(terminalVolts)} is. Look at the unit and the column.`;
    if (celsius !== null && (celsius < LEAST_CELSIUS || celsius > MOST_CELSIUS))
      return `${celsiusText(celsius)} is no temperature of a module. Look at the unit and the column.`;
    const group = groupVolts?.find((volts) => volts < 0 || volts > mostGroupVolts);
    if (group !== undefined)
      return `More or less than a group shows, as ${cellText(group)} is. Look at the unit and the columns.`;
    return null;
  };
  return (values) => {
    const wrong = problem(values);
    if (wrong !== null) return wrong;
    if (values.amps === null) return values;
    const amps = ampsOf(values.amps);
    return typeof amps === 'string' ? amps : { ...values, amps };
  };
}
