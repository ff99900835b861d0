import { describe, expect, it } from 'vitest';
import {
  correctedInstant,
  emptyLog,
  logOf,
  logSchema,
  nothingTyped,
  type LogValues,
} from '@/shared/ui/charge/log-form';
import { latestInstant } from '@/shared/ui/charge/said-at';
import { at, charge, now, reading, zone } from './charges';

const window = { ...charge('charging'), groupsInSeries: 3 };
const schema = logSchema({ window, direction: 'charge', zone, now: () => now });
const read = (more: Partial<LogValues>) => {
  const result = schema.safeParse({ ...emptyLog(3), ...more });
  return result.success
    ? { data: result.data }
    : { errors: Object.fromEntries(result.error.issues.map(({ path, message }) => [path.join('.'), message])) };
};

describe('a reading as it is typed', () => {
  it('takes comma, point and a pasted unit, and leaves empty what was not read', () => {
    expect(read({ terminalVolts: '11,68 V', amps: '10.0' }).data).toEqual({
      terminalVolts: 11.68,
      amps: 10,
      celsius: null,
      groupVolts: null,
      meterId: null,
      reason: null,
    });
  });

  it('asks about −5 A where it charges, and takes them where it discharges', () => {
    expect(read({ amps: '-5 A' }).errors).toEqual({
      amps: '−5.0\u00a0A would be a discharge; this one charges. 5.0\u00a0A?',
    });
    const out = logSchema({ window, direction: 'discharge', zone, now: () => now });
    expect(out.parse({ ...emptyLog(3), amps: '-5 A' })).toMatchObject({ amps: -5 });
  });

  it('says where the clips were read where a meter is named, and leaves the charger’s own display to the server', () => {
    const volts = { terminalVolts: '11.68' };
    expect(read({ ...volts, meterId: 'm1', takenAt: 'module' }).data?.takenAt).toBe('module');
    expect(read({ ...volts, meterId: 'm1', takenAt: '' }).data?.takenAt).toBeNull();
    expect(read({ ...volts, meterId: null, takenAt: 'module' }).data?.takenAt).toBeUndefined();
  });

  it('asks for at least one number, without blaming a field', () => {
    expect(read({}).errors).toEqual({ [nothingTyped]: 'Type at least one number that was read.' });
  });

  it('wants all groups or none, and names those that are open', () => {
    expect(read({ groupVolts: ['3.896', '', ''] }).errors).toEqual({
      'groupVolts.1': 'G2 and G3 are open. Type all groups, or none.',
      'groupVolts.2': 'G2 and G3 are open. Type all groups, or none.',
    });
  });

  it('asks whether 3968 is in millivolts, and lets a group 50 mV over its limit be logged', () => {
    expect(read({ groupVolts: ['3.896', '3.895', '3968'] }).errors).toEqual({
      'groupVolts.2': "3968\u00a0V is over this type's 4.20\u00a0V. In millivolts? Then it is 3.968\u00a0V.",
    });
    expect(read({ groupVolts: ['4.25', '3.895', '3.890'] }).data?.groupVolts).toEqual([4.25, 3.895, 3.89]);
  });

  it('says of letters and of a wrong unit what to type', () => {
    expect(read({ amps: 'ten', celsius: '24 V' }).errors).toEqual({
      amps: '“ten” is no number. Type it like 3.968.',
      celsius: '“24 V” is in another unit. Type it in °C.',
    });
  });
});

describe('when it was read', () => {
  it('is today’s clock, or yesterday’s where today’s is still to come', () => {
    expect(latestInstant('1315', zone, now)).toBe(at('13:15'));
    expect(latestInstant('23:50', zone, now)).toBe(at('23:50') - 86_400_000);
    expect(latestInstant('25:00', zone, now)).toBeNull();
    expect(read({ amps: '10', at: '13:15' }).data?.at).toBe(new Date(at('13:15')).toISOString());
    expect(read({ amps: '10', at: 'noon' }).errors).toEqual({ at: 'This is no time. Type it like 14:05.' });
  });

  it('of a correction keeps its second where the minute is the same, and its day across midnight', () => {
    const old = { ...reading('13:36'), at: new Date(at('13:36') + 41_000).toISOString() };
    expect(logOf(old, 3, zone, { decimal: ',', hour12: false })).toMatchObject({ terminalVolts: '11,64', at: '13:36' });
    expect(correctedInstant(old, zone)('13:36')).toBe(at('13:36') + 41_000);
    expect(correctedInstant(old, zone)('13:26')).toBe(at('13:26'));
    const night = { ...reading('13:36'), at: new Date(at('00:05')).toISOString() };
    expect(correctedInstant(night, zone)('23:58')).toBe(at('23:58') - 86_400_000);
  });
});
