import { SLOW_REST, TARGET_TRUST } from '../parameters/pack';

export type TargetTrust = 'good' | 'fair' | 'poor';

export type TargetReason =
  'flat-curve' | 'old-reading' | 'few-healthy' | 'wide-spread' | 'short-rest' | 'unknown-rest' | 'cold-or-warm';

export interface TrustFacts {
  groups: number;
  healthy: number;
  /** Of the healthy groups, V. */
  spreadVolts: number;
  soc: number;
  slopeVoltsPerSoc: number;
  hysteresisVolts: number;
  ageS: number;
  /** Null: nobody noted it; undefined: not judged. */
  restS: number | null | undefined;
  celsius: number;
  curveCelsius: number;
}

/**
 * How far a target can be trusted: as far as the weightiest reason against it lets. The limits and why they are what they are:
 * `TARGET_TRUST` in parameters/pack.
 */
export function targetTrust(facts: TrustFacts): { trust: TargetTrust; reasons: TargetReason[] } {
  const found = new Map<TargetReason, TargetTrust>();
  const above = (reason: TargetReason, value: number, limit: { fair: number; poor: number }): void => {
    if (value > limit.fair) note(reason, value > limit.poor ? 'poor' : 'fair');
  };
  const note = (reason: TargetReason, trust: TargetTrust): void => {
    if (found.get(reason) !== 'poor') found.set(reason, trust);
  };

  // A slope of 0 beyond a curve's end makes these infinite, and the trust poor, as it should.
  above('flat-curve', 0.001 / facts.slopeVoltsPerSoc, TARGET_TRUST.socPerMillivolt);
  if (facts.hysteresisVolts > 0)
    above('flat-curve', facts.hysteresisVolts / facts.slopeVoltsPerSoc, TARGET_TRUST.hysteresisSoc);
  above('old-reading', facts.ageS, TARGET_TRUST.ageS);
  // Where half of the groups are odd, the median is as likely one of theirs.
  if (facts.healthy < TARGET_TRUST.healthy.fair || 2 * facts.healthy <= facts.groups)
    note(
      'few-healthy',
      facts.healthy < TARGET_TRUST.healthy.poor || 2 * facts.healthy <= facts.groups ? 'poor' : 'fair',
    );
  above('wide-spread', facts.spreadVolts, TARGET_TRUST.spreadVolts);
  if (facts.restS === null) note('unknown-rest', 'fair');
  else if (facts.restS !== undefined) {
    const slow = facts.celsius < SLOW_REST.celsius || facts.soc < SLOW_REST.belowSoc || facts.soc > SLOW_REST.aboveSoc;
    const longer = slow ? SLOW_REST.longer : 1;
    if (facts.restS < longer * TARGET_TRUST.restS.fair)
      note('short-rest', facts.restS < longer * TARGET_TRUST.restS.poor ? 'poor' : 'fair');
  }
  above('cold-or-warm', Math.abs(facts.celsius - facts.curveCelsius), TARGET_TRUST.celsiusAway);

  const poor = [...found].filter(([, trust]) => trust === 'poor').map(([reason]) => reason);
  const fair = [...found].filter(([, trust]) => trust === 'fair').map(([reason]) => reason);
  return { trust: poor.length > 0 ? 'poor' : fair.length > 0 ? 'fair' : 'good', reasons: [...poor, ...fair] };
}
