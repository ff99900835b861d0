import { useState } from 'react';
import { sentenceOf } from '@/shared/client/api-problem';
import { useChangeAlertSettings } from '@/shared/client/alert-settings';
import { useLink } from '@/shared/client/link';
import { causeKey, type AlertCause, type AlertSettingsDto, type AlertWay } from '@/shared/contract/alert-settings';
import { CauseList } from '@/shared/ui/alerts/cause-list';
import { WaysSheet } from '@/shared/ui/alerts/ways-sheet';
import { Txt } from '@/shared/ui/primitives/txt';

/** Which cause goes where. */
export function CausesPart({ settings }: { settings: AlertSettingsDto }) {
  const change = useChangeAlertSettings();
  const offline = useLink().state === 'down';
  const [chosen, setChosen] = useState<AlertCause | null>(null);
  const open = chosen ? (settings.ways.find((one) => causeKey(one) === causeKey(chosen)) ?? null) : null;
  return (
    <>
      <Txt kind="small" tone="ink2">
        The list of alerts shows every cause to everybody. Here you say what reaches you beside it.
      </Txt>
      <CauseList
        ways={settings.ways}
        onChoose={(cause) => {
          change.reset();
          setChosen(cause);
        }}
      />
      <WaysSheet
        key={chosen ? causeKey(chosen) : 'none'}
        cause={open}
        meanings={meaningsOf(settings)}
        busy={change.isPending}
        offline={offline}
        problem={change.error ? sentenceOf(change.error) : null}
        onClose={() => setChosen(null)}
        onSave={(ways) =>
          open &&
          change.mutate({ ways: [{ kind: open.kind, level: open.level, ways }] }, { onSuccess: () => setChosen(null) })
        }
      />
    </>
  );
}

function meaningsOf({ devices, eMail }: AlertSettingsDto): Partial<Record<AlertWay, string>> {
  const has = (kind: 'browser' | 'phone') => devices.some((device) => device.kind === kind);
  return {
    ...(has('browser') ? {} : { 'browser-push': 'No browser yet: switch push on under Devices.' }),
    ...(has('phone') ? {} : { 'phone-push': 'No phone yet: switch push on in the app on the phone.' }),
    'e-mail': eMail.on ? `To ${eMail.address}.` : 'This server sends no e-mail.',
  };
}
