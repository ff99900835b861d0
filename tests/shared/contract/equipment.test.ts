import { describe, expect, it } from 'vitest';
import { chargerSchema, meterSchema, moduleTypeSchema } from '@/shared/contract/equipment';
import { channelForm, moduleTypeForm } from '../../support/forms';

type Parsed = { success: boolean; error?: { issues: { path: PropertyKey[]; message: string }[] } };
const problems = (result: Parsed): Record<string, string> =>
  Object.fromEntries((result.error?.issues ?? []).map(({ path, message }) => [path.join('.'), message]));

describe('the form of a module type', () => {
  it('takes what is typed, empty fields as not known', () => {
    const type = moduleTypeSchema.parse(
      moduleTypeForm({ ratedAh: '66 Ah', chargeLimitVolts: '4,20', resistanceMilliohm: '', shelfVolts: ' ', note: '' }),
    );
    expect(type).toMatchObject({ ratedAh: 66, chargeLimitVolts: 4.2, resistanceMilliohm: null, note: null });
    expect(type.shelfVolts).toBeNull();
  });

  it.each([
    [{ name: '  ' }, { name: 'The name is missing.' }],
    [{ ratedAh: '0 Ah' }, { ratedAh: '0\u00a0Ah is too little. Rated capacity is more than 0\u00a0Ah.' }],
    [{ dischargeLimitVolts: '4.3', floorVolts: '2' }, { dischargeLimitVolts: expect.stringContaining('over 4') }],
    [{ dischargeLimitVolts: '4', chargeLimitVolts: '3.9' }, { dischargeLimitVolts: 'Must be under the charge limit.' }],
    [{ floorVolts: '3.2' }, { floorVolts: 'The floor is not above the discharge limit.' }],
    [{ maxChargeCelsius: '5', minChargeCelsius: '10' }, { maxChargeCelsius: 'Must be above the lower end.' }],
    [{ shelfVolts: '4.4' }, { shelfVolts: 'Outside the limits of this type.' }],
    [{ groupsInSeries: '2.5' }, { groupsInSeries: 'Groups in series is a whole number.' }],
  ])('with %o says %o', (change, answer) => {
    expect(problems(moduleTypeSchema.safeParse(moduleTypeForm(change)))).toMatchObject(answer);
  });
});

describe('the form of a charger', () => {
  const charger = (channel: object) => ({
    name: 'Supply B',
    place: '',
    meterId: null,
    channels: [channelForm(channel)],
  });

  it('refuses a least current that is not under the current', () => {
    expect(problems(chargerSchema.safeParse(charger({ minAmps: '20' })))).toEqual({
      'channels.0.minAmps': 'Must be under the current.',
    });
  });

  it('asks a channel that discharges for its current or its load', () => {
    const message = 'A channel that discharges needs its current or its load resistor.';
    expect(problems(chargerSchema.safeParse(charger({ canDischarge: true })))).toEqual({
      'channels.0.dischargeAmps': message,
    });
    expect(chargerSchema.safeParse(charger({ canDischarge: true, loadOhm: '0.5 Ω' })).success).toBe(true);
  });

  it('refuses a charger without a channel', () => {
    expect(problems(chargerSchema.safeParse({ ...charger({}), channels: [] }))).toEqual({
      channels: 'A charger has at least one channel.',
    });
  });
});

describe('the form of a meter', () => {
  it('takes an offset of −3 mV with a true minus sign and no cross-check', () => {
    expect(meterSchema.parse({ name: 'Hand meter', offsetMillivolts: '−3 mV', checkedAt: '' })).toEqual({
      name: 'Hand meter',
      offsetMillivolts: -3,
      checkedAt: null,
    });
  });

  it('refuses a cross-check that is no day', () => {
    expect(problems(meterSchema.safeParse({ name: 'M', offsetMillivolts: '0', checkedAt: 'April' }))).toHaveProperty(
      'checkedAt',
    );
  });
});
