import { MINUS, pointMarks, type LocaleMarks } from './marks';

/**
 * A plain number with a fixed count of decimals, halves away from zero, true minus, never '−0'.
 *
 * The last bit of a binary fraction is forgiven (3.9685 rounds up although it is stored a hair below).
 */
export function fixed(value: number, decimals: number, marks: LocaleMarks = pointMarks): string {
  const scale = 10 ** decimals;
  const whole = Math.round(Math.abs(value) * scale * (1 + 4 * Number.EPSILON));
  const digits = (whole / scale).toFixed(decimals);
  const text = marks.decimal === ',' ? digits.replace('.', ',') : digits;
  return value < 0 && whole > 0 ? MINUS + text : text;
}

/** As `fixed`, with a plus before what is above zero. */
export function signed(value: number, decimals: number, marks: LocaleMarks = pointMarks): string {
  const text = fixed(value, decimals, marks);
  return value > 0 && /[1-9]/.test(text) ? `+${text}` : text;
}

/** Up to so many decimals, without trailing zeros: 20, 12.5. */
export function shortest(value: number, maxDecimals: number, marks: LocaleMarks = pointMarks): string {
  const text = fixed(value, maxDecimals, pointMarks)
    .replace(/(\.\d*?)0+$/, '$1')
    .replace(/\.$/, '');
  return marks.decimal === ',' ? text.replace('.', ',') : text;
}
