/** The voltages of a module's groups inside a form: what field and pad need of it. */
import type { UseFormReturn } from 'react-hook-form';
import { groupCountProblem } from '@/shared/contract/group-volts';

/** Any form with a list of typed voltages named `groupVolts`. */
export type GroupForm = Pick<
  UseFormReturn<{ groupVolts: string[] }>,
  'control' | 'setValue' | 'setFocus' | 'trigger' | 'getValues'
>;

/** A form whose values hold more than the groups, seen as one of the groups alone. */
export const asGroupForm = (form: object): GroupForm => form as GroupForm;

/** From so many groups on a phone gets the pad instead of fields. */
export const padAbove = 6;

/**
 * Several voltages pasted into one field: '3.968 3.966', one a line, separated by semicolons, or by commas where the
 * decimals have points.
 * @returns null: it is one value
 */
export function pastedVolts(text: string): string[] | null {
  const parts = text
    .replace(/(\d)\s*[vV](?![a-zA-Z])/g, '$1')
    .split(/[\s;]+|,(?=\s)|,(?=\d+\.\d)/)
    .map((part) => part.trim())
    .filter((part) => part !== '');
  return parts.length > 1 && parts.every((part) => /^[−-]?\d+([.,]\d+)?$/.test(part)) ? parts : null;
}

/** The groups that are still empty, counted from 1. */
export const openGroups = (values: readonly string[]): number[] =>
  values.flatMap((value, index) => (value.trim() === '' ? [index + 1] : []));

/** 'G3', 'G3 and G5', 'G3, G5 and 2 more' */
export function groupList(numbers: readonly number[]): string {
  const names = numbers.map((number) => `G${number}`);
  if (names.length <= 1) return names.join('');
  if (names.length <= 4) return `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
  return `${names.slice(0, 3).join(', ')} and ${names.length - 3} more`;
}

/** The sentence where so many voltages do not fit into the groups from one on (counted from 0); null: they fit. */
export function pasteProblem(pasted: number, from: number, count: number): string | null {
  const room = count - from;
  if (pasted <= room) return null;
  // A list no longer than the module overruns only because of where it was pasted.
  return pasted <= count
    ? `From group ${from + 1} on there is room for ${room}; ${pasted} voltages were pasted.`
    : groupCountProblem(pasted, { groupsInSeries: count });
}

/** Puts a pasted list that fits into the groups from one on. */
export const spreadVolts = (form: GroupForm, from: number, values: readonly string[]): void =>
  values.forEach((value, index) => form.setValue(`groupVolts.${from + index}`, value, { shouldDirty: true }));
