import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import type { ModuleTypeDto } from '@/shared/contract/equipment';
import { dayName } from '../format/clock';
import { useFormats } from '../format/formats';
import { NBSP } from '../format/marks';
import { addDays, dayOf } from '../format/zone';
import { Txt } from '../primitives/txt';
import { daysWords, driftOf } from './drift';

/** Longer than this nobody plans ahead, days. */
const longest = 90;

/** By when a ready module is to be fitted. Loaded late, since it brings the curves. */
export function DriftLine({
  charge,
  type,
  now,
}: {
  charge: ChargeDto;
  now: number;
  type: Pick<ModuleTypeDto, 'chemistry' | 'selfDischargePercentPerMonth'>;
}) {
  const { zone } = useFormats();
  const check = charge.restChecks.at(-1);
  if (!check) return null;
  const percent = type.selfDischargePercentPerMonth;
  const drift = driftOf(
    type.chemistry,
    percent === null ? null : percent / 100,
    charge.targetVolts,
    charge.toleranceVolts,
    check.verdict,
  );
  const today = dayOf(now, zone);
  const again = addDays(dayOf(Date.parse(check.at), zone), Math.floor(drift.daysInTolerance));
  const due = again <= today;
  const then = due
    ? ': check it again if it is not fitted today.'
    : drift.daysInTolerance > longest
      ? '.'
      : `: check again from ${dayName(again, today)}.`;
  return (
    <View>
      <Txt bold>Fit it today.</Txt>
      <Txt kind="small" tone="ink2">
        {`It drifts about 1${NBSP}mV ${daysWords(drift.daysPerMillivolt)}${then}`}
      </Txt>
    </View>
  );
}
