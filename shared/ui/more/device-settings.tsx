import { View } from 'react-native';
import { Button } from '../primitives/button';
import { Caution } from '../primitives/call-out';
import { SegmentSwitch } from '../primitives/segment-switch';
import { Txt } from '../primitives/txt';
import { MoreGroup, MoreSetting } from './more-row';

export type ThemeChoice = 'system' | 'paper' | 'night';

export interface DeviceSettingsProps {
  theme: ThemeChoice;
  onTheme: (theme: ThemeChoice) => void;
  /** muted: the browser waits for a tap. none: this device has no sound. */
  sound: 'on' | 'off' | 'muted' | 'none';
  onSound: (on: boolean) => void;
  onTrySound: () => void;
  notices: 'granted' | 'denied' | 'default' | 'unavailable' | null;
  onAllowNotices: () => void;
  onTestNotice: () => void;
  /** What the test did. */
  tested: 'shown' | 'not-shown' | null;
  /** What plain http switches off here, in sentences. */
  missing: readonly string[];
}

const soundWords: Record<DeviceSettingsProps['sound'], string> = {
  on: 'Alerts sound here while this page is open.',
  off: 'Off: alerts are silent on this device.',
  muted: 'Muted by the browser until you tap once on this page.',
  none: 'This browser plays no sound.',
};
const noticeWords: Record<NonNullable<DeviceSettingsProps['notices']>, string> = {
  granted: 'Shown while this page is open in the background.',
  default: 'Not asked yet.',
  denied: 'Refused on this device. Allow it in the browser’s settings of this site.',
  unavailable: 'Not to be had in this browser at this address.',
};

/** Theme, sound and notices of this device. */
export function DeviceSettings(props: DeviceSettingsProps) {
  const { theme, sound, notices, missing } = props;
  return (
    <MoreGroup title="This device">
      <MoreSetting title="Look">
        <SegmentSwitch
          label="Look"
          value={theme}
          segments={[
            { value: 'system', label: 'As the device' },
            { value: 'paper', label: 'Paper' },
            { value: 'night', label: 'Night' },
          ]}
          onChange={props.onTheme}
        />
      </MoreSetting>
      <MoreSetting title="Sound of alerts" meaning={soundWords[sound]}>
        {sound === 'none' ? null : (
          <View style={{ flexDirection: 'row', columnGap: 8 }}>
            <Button
              title={sound === 'off' ? 'Switch it on' : 'Switch it off'}
              look="line"
              size="small"
              grow
              onPress={() => props.onSound(sound === 'off')}
            />
            <Button
              title="Play a sound"
              look="line"
              size="small"
              grow
              disabled={sound === 'off'}
              onPress={props.onTrySound}
            />
          </View>
        )}
      </MoreSetting>
      <MoreSetting title="Notices outside this page" meaning={noticeWords[notices ?? 'default']}>
        {notices === 'default' ? (
          <Button title="Allow notices" look="line" size="small" onPress={props.onAllowNotices} />
        ) : notices === 'granted' ? (
          <Button title="Show one now" look="line" size="small" onPress={props.onTestNotice} />
        ) : null}
        {props.tested ? (
          <Txt kind="small" tone="ink2" role="status">
            {props.tested === 'shown'
              ? 'Sent to the system. Not seen? Look at the system’s own settings for this browser.'
              : 'It could not be shown. Load the page again and try once more.'}
          </Txt>
        ) : null}
      </MoreSetting>
      {missing.map((sentence) => (
        <Caution key={sentence} style={{ marginTop: 8 }}>
          {sentence}
        </Caution>
      ))}
    </MoreGroup>
  );
}
