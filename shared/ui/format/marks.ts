/** The no-break space between a number and its unit. */
export const NBSP = '\u00a0';
/** The true minus sign. */
export const MINUS = '\u2212';
/** The dash of a band. */
export const EN_DASH = '\u2013';

/** What changes with the language of the device; the words of the screens stay English. */
export interface LocaleMarks {
  decimal: '.' | ',';
  /** The clock runs to 12 and says am or pm. */
  hour12: boolean;
}

export const pointMarks: LocaleMarks = { decimal: '.', hour12: false };

/**
 * The decimal mark and clock of a language tag ('de-CH', 'en-GB').
 *
 * An unknown or broken tag gives the point and 24 hours.
 */
export function marksOf(languageTag: string): LocaleMarks {
  try {
    const decimal = new Intl.NumberFormat(languageTag)
      .formatToParts(1.5)
      .find((part) => part.type === 'decimal')?.value;
    const clock = new Intl.DateTimeFormat(languageTag, { hour: 'numeric' }).resolvedOptions();
    return { decimal: decimal === ',' ? ',' : '.', hour12: clock.hour12 === true };
  } catch {
    return pointMarks;
  }
}
