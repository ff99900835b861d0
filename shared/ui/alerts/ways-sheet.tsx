import { useState } from 'react';
import { View } from 'react-native';
import { alertKindNames } from '@/shared/contract/alert-kinds';
import { alertWays, type AlertCause, type AlertWay } from '@/shared/contract/alert-settings';
import { ProblemLine } from '../auth/problem-line';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { CheckBox } from '../primitives/check-box';
import { Txt } from '../primitives/txt';
import { levelTitles, wayNames } from './way-words';

/** Where one cause goes. What is ticked is kept while it could not be sent. Key it by its cause. */
export function WaysSheet({
  cause,
  meanings,
  busy,
  offline,
  problem,
  onSave,
  onClose,
}: {
  /** Null: closed. */
  cause: (AlertCause & { ways: AlertWay[] }) | null;
  /** What stands in the way of a way: no device yet, no e-mail on this server. */
  meanings: Partial<Record<AlertWay, string>>;
  busy: boolean;
  offline: boolean;
  problem: string | null;
  onSave: (ways: AlertWay[]) => void;
  onClose: () => void;
}) {
  const [ticked, setTicked] = useState<readonly AlertWay[]>(cause?.ways ?? []);
  const flip = (way: AlertWay) => (on: boolean) =>
    setTicked((before) => (on ? [...before, way] : before.filter((one) => one !== way)));
  return (
    <BottomSheet
      open={cause !== null}
      onClose={onClose}
      title={cause ? alertKindNames[cause.kind] : ''}
      aside={cause ? levelTitles[cause.level] : undefined}
      scrimCloses={false}
      actions={
        <Button
          title="Save"
          label="Save where it goes"
          busy={busy}
          disabled={offline}
          describedBy={offline ? 'ways-offline' : undefined}
          onPress={() => onSave(alertWays.filter((way) => ticked.includes(way)))}
        />
      }
    >
      {alertWays.map((way) => (
        <CheckBox
          key={way}
          checked={ticked.includes(way)}
          onChange={flip(way)}
          title={wayNames[way]}
          meaning={meanings[way]}
        />
      ))}
      {offline ? (
        <View nativeID="ways-offline">
          <Txt kind="small" tone="ink2">
            Saving needs the connection.
          </Txt>
        </View>
      ) : null}
      <ProblemLine text={problem} />
    </BottomSheet>
  );
}
