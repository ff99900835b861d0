/** Numbers and times as papers carry them (look §7). */
import { DateTime } from 'luxon';

const GAP = '\u00a0';

export interface PaperWords {
  /** '3.956' */
  voltsNumber: (volts: number) => string;
  volts: (volts: number) => string;
  /** '91 mV' out of millivolts. */
  millivolts: (millivolts: number) => string;
  /** '±5 mV' out of volts. */
  tolerance: (volts: number) => string;
  ampHours: (ampHours: number) => string;
  celsius: (celsius: number) => string;
  /** 'Tuesday 9 June 2026' */
  dateLong: (at: number) => string;
  /** 'Tue 9 June'; with the year where it is not that of the paper. */
  date: (at: number) => string;
  clock: (at: number) => string;
}

/**
 * @param decimal mark of the device that asks
 * @param paperAt when the paper came about: years that are not its own are said
 */
export function paperWords(zone: string, decimal: 'point' | 'comma', paperAt: number): PaperWords {
  const fixed = (value: number, places: number): string => {
    const digits = (Math.round(Math.abs(value) * 10 ** places * (1 + 4 * Number.EPSILON)) / 10 ** places).toFixed(
      places,
    );
    const text = decimal === 'comma' ? digits.replace('.', ',') : digits;
    return value < 0 && /[1-9]/.test(text) ? `−${text}` : text;
  };
  const local = (at: number) => DateTime.fromMillis(at, { zone, locale: 'en' });
  return {
    voltsNumber: (volts) => fixed(volts, 3),
    volts: (volts) => `${fixed(volts, 3)}${GAP}V`,
    millivolts: (millivolts) => `${fixed(millivolts, 0)}${GAP}mV`,
    tolerance: (volts) => `±${fixed(volts * 1000, 0)}${GAP}mV`,
    ampHours: (ampHours) => `${fixed(ampHours, 1)}${GAP}Ah`,
    celsius: (celsius) => `${fixed(celsius, 0)}${GAP}°C`,
    dateLong: (at) =>
      local(at)
        .toFormat('cccc d LLLL yyyy')
        .replace(/ (?=\d|[A-Z])/g, GAP)
        .replace(GAP, ' '),
    date: (at) =>
      local(at)
        .toFormat(local(at).year === local(paperAt).year ? 'ccc d LLLL' : 'ccc d LLLL yyyy')
        .replace(/ /g, GAP),
    clock: (at) => local(at).toFormat('HH:mm'),
  };
}
