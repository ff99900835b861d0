/** What this device has told of each alert, over reloads and in all its tabs: so nothing is missed and nothing told twice. */
import type { AlertDto } from '@/shared/contract/alert';
import { ringsSince } from './alarm-rings';
import { recallJson, rememberJson } from './storage';

/** What was told of one alert; of one that was passed on since, nothing. */
interface Told {
  since: number;
  /** Till when its rings were heard here, epoch ms; null: never. */
  heardTo: number | null;
  /** This device has met it: in sight as it was raised, or by a notice. */
  met: boolean;
}

const key = 'alerts.told';

/** The ledger of this device for these alerts; `keep` writes it down and forgets alerts that are not listed any more. */
export function toldOf(alerts: readonly AlertDto[]) {
  const kept = recallJson<Record<string, Told>>(key, {});
  const before = JSON.stringify(kept);
  const next = Object.fromEntries(
    alerts.map((alert): [string, Told] => {
      const since = ringsSince(alert);
      const told = kept[alert.id];
      return [alert.id, told?.since === since ? told : { since, heardTo: null, met: false }];
    }),
  );
  return {
    of: (alert: AlertDto): Told => next[alert.id] ?? { since: ringsSince(alert), heardTo: null, met: false },
    keep: (): void => {
      if (JSON.stringify(next) !== before) rememberJson(key, next);
    },
  };
}
