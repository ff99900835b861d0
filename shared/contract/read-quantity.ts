/**
 * Numbers as people type them: comma or point, spaces, a pasted unit. One reader for forms and the API,
 * so that both refuse the same things with the same sentence. Free of schemas: the bench reads without them.
 */

export interface QuantityRule {
  /** What it is, as the sentence begins: 'Target', 'Amps'. */
  name: string;
  unit: '' | 'V' | 'mV' | 'A' | 'Ah' | 'W' | 'mΩ' | 'Ω' | '°C' | '%' | 's' | 'min' | 'h' | 'm' | 'in' | 'C';
  min?: number;
  max?: number;
  /** `min` itself is refused too. */
  aboveMin?: boolean;
  whole?: boolean;
}

export type QuantityReading = { ok: true; value: number } | { ok: false; message: string };

const unitPattern = /\s*(mv|mω|mohm|ohm|ω|volts?|amps?|v|ah|a|w|°\s*c|%|min|h|m|in|c|s)$/i;
const shown = (value: number): string => String(value).replace('-', '−');
const withUnit = (text: string, unit: string): string => (unit ? `${text}\u00a0${unit}` : text);

/** Proposes what was meant by a number beyond its range, where a slip of the point or of the unit explains it. */
function proposal(value: number, rule: QuantityRule): string {
  if (rule.max === undefined) return '';
  if (rule.unit === 'V' && Number.isInteger(value) && value >= 500 && value / 1000 <= rule.max)
    return ` ${shown(value)} looks like millivolts: ${withUnit((value / 1000).toFixed(3), 'V')}?`;
  if (value > 0 && value / 10 <= rule.max && value / 10 >= (rule.min ?? 0)) return ' A point in the wrong place?';
  return '';
}

function rangeMessage(value: number, rule: QuantityRule): string | null {
  const unit = rule.unit;
  const number = withUnit(shown(value), unit);
  if (rule.min !== undefined && (value < rule.min || (rule.aboveMin && value === rule.min)))
    return rule.aboveMin || rule.min === 0
      ? `${number} is too little. ${rule.name} is ${rule.aboveMin ? 'more than' : 'at least'} ${withUnit(shown(rule.min), unit)}.`
      : `${number} is under ${withUnit(shown(rule.min), unit)}, the least for this.`;
  if (rule.max !== undefined && value > rule.max)
    return `${number} is over ${withUnit(shown(rule.max), unit)}, the most for this.${proposal(value, rule)}`;
  return null;
}

/**
 * Reads one typed quantity in the rule's unit.
 * A comma is a decimal comma; `3,957 V` is 3.957 V. Gives the number, or the sentence that says what to change.
 */
export function readQuantity(raw: unknown, rule: QuantityRule): QuantityReading {
  if (typeof raw === 'number') {
    if (!Number.isFinite(raw)) return { ok: false, message: `${rule.name} is no number. Type it like 3.968.` };
    return checked(raw, rule);
  }
  const typed = typeof raw === 'string' ? raw.replace(/[\s\u00a0\u202f]+/g, ' ').trim() : '';
  if (typed === '')
    return { ok: false, message: `${rule.name} is missing. Type it${rule.unit ? ` in ${rule.unit}` : ''}.` };
  const unit = unitPattern.exec(typed)?.[1];
  const bare = typed
    .replace(unitPattern, '')
    .replace(/ /g, '')
    .replace(/^[−–]/, '-')
    .replace(/^±/, '')
    .replace(',', '.');
  if (!/^[+-]?(\d+\.?\d*|\.\d+)$/.test(bare))
    return { ok: false, message: `“${typed.slice(0, 24)}” is no number. Type it like ${rule.whole ? '60' : '3.968'}.` };
  let value = Number(bare);
  // A pasted unit of the same kind is converted, never guessed.
  if (unit && rule.unit === 'V' && unit.toLowerCase() === 'mv') value /= 1000;
  else if (unit && rule.unit === 'mV' && /^v/i.test(unit)) value *= 1000;
  else if (unit && !sameUnit(unit, rule.unit))
    return {
      ok: false,
      message: `“${typed.slice(0, 24)}” is in another unit. Type it${rule.unit ? ` in ${rule.unit}` : ' without a unit'}.`,
    };
  return checked(value, rule);
}

function sameUnit(typed: string, wanted: string): boolean {
  const name = typed
    .toLowerCase()
    .replace(/\s/g, '')
    .replace('mohm', 'mω')
    .replace('ohm', 'ω')
    .replace(/^volts?$/, 'v')
    .replace(/^amps?$/, 'a');
  const target = wanted.toLowerCase();
  return name === target || (target === '°c' && (name === 'c' || name === '°c'));
}

function checked(value: number, rule: QuantityRule): QuantityReading {
  const message = rangeMessage(value, rule);
  if (message) return { ok: false, message };
  if (rule.whole && !Number.isInteger(value)) return { ok: false, message: `${rule.name} is a whole number.` };
  return { ok: true, value };
}
