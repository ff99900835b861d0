import {
  chargeGroupByGroup,
  chargeParalleled,
  chargeThroughTerminals,
  equaliseThroughResistor,
  type StepResult,
} from '@/calc/index';
import { describe, expect, it } from 'vitest';
import { expectSeconds, expectShare, expectVolts } from './reference/agreement';
import {
  EQUALISE_CASE,
  GROUP_BY_GROUP_CASE,
  PARALLELED_CASE,
  SERIES_CASES,
  UNREACHABLE_CASE,
  type SeriesExpectation,
} from './reference/worked-cases';

function expectStep(result: StepResult, expected: SeriesExpectation): void {
  expect(result.outcome).toBe(expected.outcome);
  expect(result.limitingGroup).toBe(expected.limitingGroup);
  if (expected.voltageLimitAtS === null) expect(result.voltageLimitAtS).toBeNull();
  else expectSeconds(result.voltageLimitAtS!, expected.voltageLimitAtS, 'first voltage limit');
  expectSeconds(result.stopAtS, expected.stopAtS, 'end of current');
  expectSeconds(result.settleS, expected.settleS, 'rest');
  expectSeconds(result.totalS, expected.totalS, 'total');
  expectShare(result.ampHours, expected.ampHours, 'Ah');
  expectShare(result.wattHours, expected.wattHours, 'Wh');
  expectShare(result.endAmps, expected.endAmps, 'end current');
  expectVolts(result.endTerminalVolts, expected.endTerminalVolts, 'terminals');
  expectVolts(result.relaxedVolts, expected.relaxedVolts, 'relaxed');
  expect(result.groups).toHaveLength(expected.groupVolts.length);
  result.groups.forEach((group, i) => {
    expectVolts(group.volts, expected.groupVolts[i]!, `group ${i}`);
    expect(group.soc).toBeCloseTo(expected.groupSoc[i]!, 5);
  });
}

describe('the worked cases of the independent numerical reference, times to 0.2 % or 2 s, Ah and Wh to 0.1 %, volts to 0.5 mV', () => {
  it.each(SERIES_CASES)('$id: $title', ({ input, expected }) => {
    expectStep(chargeThroughTerminals(input), expected);
  });

  it('W13: cell by cell on one channel to 3.84 V each takes 22 936.77 s, the sum of its four groups', () => {
    const { source, ...shared } = GROUP_BY_GROUP_CASE.input;
    const { expected } = GROUP_BY_GROUP_CASE;
    const result = chargeGroupByGroup({ ...shared, sources: [source] });
    expectSeconds(result.totalS, expected.totalS);
    expectShare(result.ampHours, expected.ampHours, 'Ah');
    expectShare(result.wattHours, expected.wattHours, 'Wh');
    result.groups.forEach((group, i) => {
      expect(group.outcome).toBe('target');
      expectSeconds(group.stopAtS, expected.eachS[i]!, `group ${i}`);
      expectShare(group.ampHours, expected.eachAmpHours[i]!, `Ah of group ${i}`);
      expectVolts(group.endTerminalVolts, expected.endTerminalVolts);
      expectVolts(group.relaxedVolts, expected.relaxedVolts);
    });
    expectSeconds(Math.max(...result.groups.map((group) => group.settleS)), expected.longestSettleS, 'longest rest');
  });

  it('W15: all groups joined start at 3.62517 V after 71.43 A between the worst pair, and end as one group', () => {
    const result = chargeParalleled(PARALLELED_CASE.input);
    expectStep(result, PARALLELED_CASE.expected);
    expectVolts(result.joinedVolts, PARALLELED_CASE.joinedVolts, 'joined');
    expectShare(result.worstPairAmps, PARALLELED_CASE.worstPairAmps, 'inrush');
  });

  it('W23: two modules through 0.5 ohm come within 10 mV after 222 066 s and 7.166 Ah', () => {
    const { expected, input } = EQUALISE_CASE;
    const result = equaliseThroughResistor(input);
    expect(result.outcome).toBe('target');
    expectSeconds(result.stopAtS, expected.stopAtS);
    expectShare(result.ampHours, expected.ampHours, 'Ah');
    expectShare(result.peakAmps, expected.peakAmps, 'peak');
    expectVolts(result.firstRelaxedVolts, expected.firstRelaxedVolts);
    expectVolts(result.secondRelaxedVolts, expected.secondRelaxedVolts);
  });

  it('X3: a target of 3.85 V under a set voltage of 3.78 V is unreachable, with both in the reason and no time', () => {
    const result = chargeThroughTerminals(UNREACHABLE_CASE.input);
    expect(result.outcome).toBe('unreachable');
    expect(result.reason).toContain('3.780 V');
    expect(result.reason).toContain('3.850 V');
    expect([result.stopAtS, result.settleS, result.totalS, result.ampHours]).toEqual([0, 0, 0, 0]);
    expectVolts(result.relaxedVolts, UNREACHABLE_CASE.relaxedVoltsLimit, 'what it tends to');
  });
});
