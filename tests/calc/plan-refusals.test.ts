import { describe, expect, it } from 'vitest';
import { planCharge, type PlanInput, type Refusal } from '@/calc/index';
import { channel, lmoSpare, planInput, target } from './plan-fixtures';

const plain = (text: string): string => text.replaceAll('\u00a0', ' ');
const refusals = (over: Partial<PlanInput>): Refusal[] => {
  const plan = planCharge(planInput(over));
  expect(plan.options).toEqual([]);
  return plan.refusals.map((one) => ({ ...one, text: plain(one.text) }));
};
const spare = (over: Partial<PlanInput['spare']>): Partial<PlanInput> => ({ spare: { ...lmoSpare, ...over } });
const aim = (over: Partial<PlanInput['target']>): Partial<PlanInput> => ({ target: { ...target, ...over } });

describe('what rules a charge out is said with its volts, its limit and what to do', () => {
  const cases: [string, Partial<PlanInput>, Refusal][] = [
    [
      'a group below the floor',
      spare({ groupVolts: [3.7, 2.41] }),
      {
        code: 'deep-discharged',
        group: 1,
        text: "G2 is at 2.410 V, under this type's floor of 2.50 V. A deep-discharged module is not charged here. Set it aside and quarantine it.",
      },
    ],
    [
      'a group the wrong way round',
      spare({ groupVolts: [-3.7, 3.7] }),
      {
        code: 'reversed',
        group: 0,
        text: "G1 reads −3.700 V: reversed. Swap the meter's leads and read again. If it stays below zero, quarantine the module.",
      },
    ],
    [
      'too cold',
      spare({ celsius: -4 }),
      {
        code: 'temperature',
        group: null,
        text: 'The module is at −4 °C. This type is charged at 0 °C to 45 °C. Warm it to 0 °C first.',
      },
    ],
    [
      'too warm',
      spare({ celsius: 51 }),
      {
        code: 'temperature',
        group: null,
        text: 'The module is at 51 °C. This type is charged at 0 °C to 45 °C. Let it cool to 45 °C first.',
      },
    ],
    [
      'too cold a room for a module nobody has read',
      { ...spare({ celsius: null }), celsius: -8 },
      {
        code: 'temperature',
        group: null,
        text: 'The module is at −8 °C. This type is charged at 0 °C to 45 °C. Warm it to 0 °C first.',
      },
    ],
    [
      'swollen',
      spare({ condition: 'swollen' }),
      {
        code: 'condition',
        group: null,
        text: 'This module is swollen. A swollen module is not charged here. Set it aside and quarantine it.',
      },
    ],
    [
      'leaking',
      spare({ condition: 'leaking' }),
      {
        code: 'condition',
        group: null,
        text: 'This module is leaking. A leaking module is not charged here. Set it aside and quarantine it.',
      },
    ],
    [
      'dented',
      spare({ condition: 'dented' }),
      {
        code: 'condition',
        group: null,
        text: 'This module is dented. A dented module is not charged here. Set it aside and quarantine it.',
      },
    ],
    [
      'wet',
      spare({ condition: 'water' }),
      {
        code: 'condition',
        group: null,
        text: 'This module has been in water. It is not charged here. Set it aside and quarantine it.',
      },
    ],
    [
      'marked deep-discharged',
      spare({ condition: 'deep-discharged' }),
      {
        code: 'deep-discharged',
        group: null,
        text: 'This module is marked deep-discharged. A deep-discharged module is not charged here. Set it aside and quarantine it.',
      },
    ],
    [
      'quarantined',
      spare({ condition: 'quarantined', quarantineReason: 'Smelled of solvent.' }),
      {
        code: 'quarantined',
        group: null,
        text: 'This module is in quarantine: Smelled of solvent. Release it there, or take another spare.',
      },
    ],
    [
      'a target over the limit',
      aim({ volts: 4.23 }),
      {
        code: 'target-over-limit',
        group: null,
        text: "The target 4.230 V is over this type's 4.20 V. Give 4.200 V or less.",
      },
    ],
    [
      'a target under the limit',
      aim({ volts: 2.65 }),
      {
        code: 'target-under-limit',
        group: null,
        text: "The target 2.650 V is under this type's 2.70 V. Give 2.700 V or more.",
      },
    ],
    [
      'a voltage too few',
      spare({ groupVolts: [3.7] }),
      { code: 'numbers', group: null, text: 'This type has 2 groups, 1 voltage is given. Type one for each group.' },
    ],
    [
      'a voltage that is none',
      spare({ groupVolts: [3.7, NaN] }),
      { code: 'numbers', group: 1, text: 'G2 has no voltage. Type its rest voltage.' },
    ],
    [
      'millivolts',
      spare({ groupVolts: [3606, 3.7] }),
      { code: 'numbers', group: 0, text: 'G1: 3606 looks like millivolts. In volts it is 3.606 V. Type it so.' },
    ],
    [
      'a point in the wrong place',
      spare({ groupVolts: [39.68, 3.9] }),
      {
        code: 'numbers',
        group: 0,
        text: "G1: 39.68 V is over this type's 4.20 V. A point in the wrong place? 3.968 V would fit.",
      },
    ],
    [
      'the whole module',
      spare({ groupVolts: [7.32, 3.66] }),
      {
        code: 'numbers',
        group: 0,
        text: 'G1: 7.320 V looks like the whole module. Over 2 groups it is 3.660 V each. Type each group.',
      },
    ],
    [
      'no capacity',
      spare({ capacityAh: 0 }),
      {
        code: 'numbers',
        group: null,
        text: 'A capacity of 0 Ah cannot be charged. Give the measured or the rated one. This type is rated 66 Ah.',
      },
    ],
    [
      'milliampere-hours',
      spare({ capacityAh: 60400 }),
      { code: 'numbers', group: null, text: '60400 Ah looks like milliampere-hours. It is 60.4 Ah. Type it so.' },
    ],
    [
      'capacities that do not match the groups',
      spare({ capacityAh: [60, 61, 62] }),
      { code: 'numbers', group: null, text: '3 capacities for 2 groups. Give one for each group, or one for all.' },
    ],
    [
      'a target in millivolts',
      aim({ volts: 3920 }),
      {
        code: 'numbers',
        group: null,
        text: 'The target 3920 looks like millivolts. In volts it is 3.920 V. Type it so.',
      },
    ],
    [
      'a target of the whole module',
      aim({ volts: 7.84 }),
      {
        code: 'numbers',
        group: null,
        text: 'The target 7.840 V looks like the whole module. Per group it is 3.920 V. Type it so.',
      },
    ],
    [
      'a tolerance in millivolts',
      aim({ toleranceVolts: 5 }),
      { code: 'numbers', group: null, text: 'A tolerance of 5 V is no match. Did you mean 5 mV?' },
    ],
    [
      'no tolerance',
      aim({ toleranceVolts: 0 }),
      { code: 'numbers', group: null, text: 'There is no tolerance. Give it in millivolts, 5 for example.' },
    ],
  ];
  it.each(cases)('%s', (_, over, expected) => {
    expect(refusals(over)).toEqual([expected]);
  });

  it('a charger that always goes to 8.40 V where 7.96 V are safe, and no other', () => {
    const [found] = refusals({ channels: [channel('F1', { adjustableVolts: false, maxVolts: 8.4, maxAmps: 20 })] });
    expect(found).toEqual({
      code: 'ceiling',
      group: null,
      text: 'F1 always charges to 8.40 V and cannot be set. Forgotten, it would go past the 7.96 V that is safe here. Take a charger whose voltage can be set.',
    });
  });

  it('says all that is wrong at once, a lost condition even where the numbers are unclear', () => {
    expect(refusals({ ...spare({ condition: 'swollen', groupVolts: [3606, 3606] }) }).map((one) => one.code)).toEqual([
      'condition',
      'numbers',
      'numbers',
    ]);
    expect(
      refusals({ ...spare({ celsius: 60, groupVolts: [2.4, -1] }), ...aim({ volts: 4.3 }) }).map((one) => one.code),
    ).toEqual(['deep-discharged', 'reversed', 'temperature', 'target-over-limit']);
  });
});
