import { View } from 'react-native';
import type { PushDeviceDto } from '@/shared/contract/alert-settings';
import { ProblemLine } from '../auth/problem-line';
import { age } from '../format/clock';
import { useFormats } from '../format/formats';
import { MoreGroup, MoreSetting } from '../more/more-row';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';

export interface PushHereProps {
  /** Null: not looked at yet. */
  state: 'on' | 'off' | 'denied' | 'unavailable' | null;
  devices: readonly PushDeviceDto[];
  now: number;
  busy: boolean;
  offline: boolean;
  problem: string | null;
  onSwitch: (on: boolean) => void;
  onRemove: (id: string) => void;
}

const words: Record<NonNullable<PushHereProps['state']>, string> = {
  on: 'On: alerts come to this device also while the page is closed.',
  off: 'Off. With it alerts come to this device also while the page is closed.',
  denied: 'Refused on this device. Allow it in the browser’s settings of this site.',
  unavailable:
    'Not to be had in this browser at this address. It takes https; some phones want the page on the home screen first.',
};

/** Push to this device, and the other devices that it goes to. */
export function PushHereSettings({ state, devices, now, busy, offline, problem, onSwitch, onRemove }: PushHereProps) {
  const { zone } = useFormats();
  const others = devices.filter((device) => !device.here);
  return (
    <MoreGroup title="Devices">
      <MoreSetting title="Push to this device" meaning={state === null ? 'Looking at this device.' : words[state]}>
        {state === 'on' || state === 'off' ? (
          <Button
            title={state === 'on' ? 'Stop pushes here' : 'Send pushes here'}
            look="line"
            size="small"
            busy={busy}
            disabled={offline}
            describedBy={offline ? 'push-offline' : undefined}
            onPress={() => onSwitch(state === 'off')}
          />
        ) : null}
        {offline ? (
          <View nativeID="push-offline">
            <Txt kind="small" tone="ink2">
              Switching it needs the connection.
            </Txt>
          </View>
        ) : null}
        <ProblemLine text={problem} />
      </MoreSetting>
      {others.map((device) => {
        const since = age(Date.parse(device.addedAt), zone, now);
        const kind = device.kind === 'phone' ? 'phone' : 'browser';
        const added = since === 'today' || since === 'yesterday' ? since : `${since} ago`;
        return (
          <MoreSetting key={device.id} title={device.name} meaning={`Push to this ${kind} since ${added}.`}>
            <Button
              title="Remove"
              label={`Remove ${device.name}`}
              look="line"
              size="small"
              disabled={offline}
              describedBy={offline ? 'push-offline' : undefined}
              onPress={() => onRemove(device.id)}
            />
          </MoreSetting>
        );
      })}
    </MoreGroup>
  );
}
