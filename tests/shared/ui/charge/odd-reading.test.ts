import { describe, expect, it } from 'vitest';
import { emptyLog, type LogValues } from '@/shared/ui/charge/log-form';
import { oddReading } from '@/shared/ui/charge/odd-reading';
import { pointMarks } from '@/shared/ui/format/marks';
import { charge, now, reading, zone } from './charges';

const typed = (more: Partial<LogValues>): LogValues => ({ ...emptyLog(3), ...more });
// At the clips each group stands 41 mV over its rest: 3.896, 3.895 and 3.890 V, 11.681 V together.
const runs = charge('charging', { readings: [reading('13:36', { groupVolts: [3.885, 3.884, 3.879] })] });
const look = (values: Partial<LogValues>, of = runs) =>
  oddReading(typed(values), of, { lagLimitVolts: 0.02, maxChargeCelsius: 45, zone, now, marks: pointMarks });

describe('a reading the plan does not explain', () => {
  it('names the group, how far it is off, what it read before and what the clips say', () => {
    const odd = look({ terminalVolts: '11.68', groupVolts: ['3.896', '3.895', '3,849'] });
    expect(odd).toMatchObject({
      field: 'groupVolts.2',
      again: 'Read group 3 again',
      seen: 'G3 is 41\u00a0mV under what was expected.',
      beside: 'It read 3.879\u00a0V at 13:36. The clips show no such fall.',
      checkFirst: 'warmth at group 3, then the meter tip on its tab, then its busbar.',
    });
  });

  it('is not a module that stands 30 mV higher as a whole, nor a group 19 mV off', () => {
    expect(look({ groupVolts: ['3.926', '3.925', '3.920'] })).toBeNull();
    expect(look({ groupVolts: ['3.896', '3.895', '3.871'] })).toBeNull();
  });

  it('says no current, and a current that has not come down', () => {
    expect(look({ amps: '0' })?.seen).toBe('No current flows. 10.0\u00a0A was expected.');
    const tapers = charge('tapering', { amps: 0.4 });
    expect(look({ amps: '3,1' }, tapers)).toMatchObject({
      seen: 'The current stands at 3.1\u00a0A. 0.4\u00a0A was expected.',
      checkFirst: 'the clips, then what A2 is set to.',
    });
    expect(look({ amps: '9.6' })).toBeNull();
  });

  it('says clips that are half a volt over, and not the 0.06 V of a lead', () => {
    expect(look({ terminalVolts: '12.18' })?.seen).toBe(
      '12.18\u00a0V at the clips is 0.50\u00a0V over what was expected.',
    );
    expect(look({ terminalVolts: '11.74' })).toBeNull();
  });

  it('puts a temperature over the limit first, whatever else is odd, even of an earlier time', () => {
    expect(look({ celsius: '47', amps: '0', at: '12:10' })?.seen).toBe('47\u00a0°C is over this type’s 45\u00a0°C.');
    expect(look({ celsius: '33' })?.seen).toBe('33\u00a0°C is 10\u00a0°C warmer than expected.');
    expect(look({ celsius: '26' })).toBeNull();
  });

  it('compares nothing with a reading of an earlier time, or while nothing flows', () => {
    expect(look({ amps: '0', at: '12:10' })).toBeNull();
    expect(look({ amps: '0', terminalVolts: '11.00' }, charge('resting', { amps: null }))).toBeNull();
  });

  it('leaves slips of the pen to the field: 3968 V and 39.68 V are not called odd', () => {
    expect(look({ groupVolts: ['3.896', '3.895', '3968'] })).toBeNull();
    expect(look({ terminalVolts: '39.68' })).toBeNull();
    expect(look({ amps: '100' })).toBeNull();
  });
});
