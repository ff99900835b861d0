/** Schemas of typed quantities. */
import * as z from 'zod/mini';
import { readQuantity, type QuantityRule } from './read-quantity';

/** Schema of one quantity: takes a string or a number, gives the number. */
export const quantity = (rule: QuantityRule) =>
  z.pipe(
    z.transform((raw: unknown, context): number => {
      const reading = readQuantity(raw, rule);
      if (reading.ok) return reading.value;
      context.issues.push({ code: 'custom', message: reading.message, input: raw });
      return Number.NaN;
    }),
    z.number(),
  );

const isBlank = (raw: unknown): boolean =>
  raw === null || raw === undefined || (typeof raw === 'string' && raw.trim() === '');

/** Schema of a quantity that may be left empty: gives null then. */
export const optionalQuantity = (rule: QuantityRule) =>
  z.pipe(
    z.transform((raw: unknown, context): number | null => {
      if (isBlank(raw)) return null;
      const reading = readQuantity(raw, rule);
      if (reading.ok) return reading.value;
      context.issues.push({ code: 'custom', message: reading.message, input: raw });
      return null;
    }),
    z.nullable(z.number()),
  );

/** One cell group at rest or at the clips; the type's own limits are checked where the type is known. */
export const groupVolts = quantity({ name: 'The voltage', unit: 'V', min: 0, max: 5 });

/** Group voltages, 1 to 24 of them (a module has that many at most); their number is checked against the type by the service. */
export const groupVoltsList = z
  .array(groupVolts)
  .check(
    z.minLength(1, 'Type the voltage of each group.'),
    z.maxLength(24, 'More than 24 groups is no module. Type those of one module.'),
  );
