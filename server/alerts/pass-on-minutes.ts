import type { AlertLevel } from '@/shared/contract/alert';
import type { Workshop } from '../entities/workshop';
import { defaultSettings } from '../services/workshop-defaults';

const defaults = defaultSettings('', 'UTC');

/** How long an alert waits for somebody before it goes on, ms; null: it never does. */
export function passOnMs(
  workshop: Pick<Workshop, 'passOnTellMinutes' | 'passOnAmberMinutes' | 'passOnAlarmMinutes'>,
  level: AlertLevel,
): number | null {
  const minutes = {
    tell: workshop.passOnTellMinutes ?? defaults.passOnTellMinutes,
    amber: workshop.passOnAmberMinutes ?? defaults.passOnAmberMinutes,
    alarm: workshop.passOnAlarmMinutes ?? defaults.passOnAlarmMinutes,
  }[level];
  return minutes === undefined || minutes === 0 ? null : minutes * 60_000;
}
