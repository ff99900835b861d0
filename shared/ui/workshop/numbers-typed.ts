import { fixed, shortest } from '../format/number';
import { pointMarks, type LocaleMarks } from '../format/marks';

/** A stored number as it would be typed: at least so many decimals, more where it has more; empty for none. */
export function typedNumber(value: number | null | undefined, least = 0, marks: LocaleMarks = pointMarks): string {
  if (value === null || value === undefined) return '';
  const own = shortest(value, 6, marks);
  const decimals = own.split(marks.decimal)[1]?.length ?? 0;
  return decimals < least ? fixed(value, least, marks) : own;
}
