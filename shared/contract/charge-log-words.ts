/** What a column of a log may hold and how it may count, in the words of the screen. No schema, for the screens' sake. */

export type LogUse = 'none' | 'time' | 'date' | 'volts' | 'amps' | 'celsius' | 'group';
export type LogSeparator = ',' | ';' | '\t';

/** 64 MB: a million lines of a logger with a handful of columns. */
export const MOST_LOG_BYTES = 64 * 1024 * 1024;
export const MOST_LOG_LINES = 1_000_000;

export const logUseWords: Record<LogUse, string> = {
  none: 'Not read',
  time: 'Time',
  date: 'Day',
  volts: 'Volts at the clips',
  amps: 'Amps',
  celsius: 'Temperature',
  group: 'Volts of a group',
};

/** Units of a use with their words; the first is the usual one. */
export const logUnits: Record<LogUse, readonly (readonly [unit: string, words: string])[]> = {
  none: [],
  time: [
    ['s', 'seconds since the start'],
    ['ms', 'milliseconds since the start'],
    ['min', 'minutes since the start'],
    ['h', 'hours since the start'],
    ['span', 'h:mm:ss since the start'],
    ['clock', 'time of day'],
    ['ymd', 'year-month-day and time'],
    ['dmy', 'day.month.year and time'],
    ['mdy', 'month/day/year and time'],
    ['epoch-s', 'seconds since 1970'],
    ['epoch-ms', 'milliseconds since 1970'],
  ],
  date: [
    ['ymd', 'year-month-day'],
    ['dmy', 'day.month.year'],
    ['mdy', 'month/day/year'],
  ],
  volts: [
    ['V', 'V'],
    ['mV', 'mV'],
  ],
  amps: [
    ['A', 'A, into the module +'],
    ['mA', 'mA, into the module +'],
    ['-A', 'A, into the module −'],
    ['-mA', 'mA, into the module −'],
  ],
  celsius: [
    ['C', '°C'],
    ['F', '°F'],
  ],
  group: [
    ['V', 'V'],
    ['mV', 'mV'],
  ],
};

/** Units of times that count from the start, and not by a clock. */
export const elapsedUnits: readonly string[] = ['s', 'ms', 'min', 'h', 'span'];
