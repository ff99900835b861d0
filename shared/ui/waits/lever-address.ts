import { leverKeys, noLevers, type LeverField, type LeverTyped } from './lever-form';
import type { AddressKey, WaitParams } from './wait-address';

/** Where the address holds what is typed for the levers. */
const keyOfField: Record<LeverField, AddressKey> = {
  ...{ shelfTypeId: 'shelftype', shelfVolts: 'shelfvolts', ampsChannelId: 'ampslike', amps: 'amps' },
  ...{ moreChannelId: 'morelike', lookInMinutes: 'lookin' },
};
const fields = Object.entries(keyOfField) as [LeverField, AddressKey][];
/** Longer is nothing that somebody typed into these fields. */
const LONGEST = 64;

/** What the address says of the levers; what is not understood in it counts as not there. */
export function leversOfAddress(params: WaitParams): LeverTyped {
  const named = (params.levers ?? '').split('.');
  const typed: LeverTyped = { ...noLevers, ticked: leverKeys.filter((key) => named.includes(key)) };
  for (const [field, key] of fields) typed[field] = (params[key] ?? '').slice(0, LONGEST);
  return typed;
}

/** The part of the address that holds the levers: '' takes out what is not set. */
export function addressOfLevers(typed: LeverTyped): WaitParams {
  const ticked = leverKeys.filter((key) => typed.ticked.includes(key));
  const params: WaitParams = { levers: ticked.join('.') };
  for (const [field, key] of fields) params[key] = typed[field].slice(0, LONGEST);
  return params;
}
