import { sentenceOf } from '@/shared/client/api-problem';
import { useRemovePushDevice } from '@/shared/client/alert-settings';
import { useNow } from '@/shared/client/clock';
import { useLink } from '@/shared/client/link';
import { usePushSwitch } from '@/shared/client/push-devices';
import type { AlertSettingsDto } from '@/shared/contract/alert-settings';
import { PushHereSettings } from '@/shared/ui/alerts/push-here';

/** Push to this device and to the others of this person. */
export function DevicesPart({ settings }: { settings: AlertSettingsDto }) {
  const { state, busy, problem, switchTo } = usePushSwitch();
  const remove = useRemovePushDevice();
  const now = useNow(60_000);
  const offline = useLink().state === 'down';
  return (
    <PushHereSettings
      state={state}
      devices={settings.devices}
      now={now}
      busy={busy}
      offline={offline}
      problem={problem ?? (remove.error ? sentenceOf(remove.error) : null)}
      onSwitch={(on) => void switchTo(on)}
      onRemove={(id) => remove.mutate({ id })}
    />
  );
}
