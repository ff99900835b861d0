import { useEffect, useEffectEvent } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import type { useChargeLog } from '@/shared/client/charge-log';
import type { ChargeDto } from '@/shared/contract/charge';
import type { LogChoices } from '@/shared/contract/charge-log';
import { LogColumns } from '@/shared/ui/charge-log/log-columns';
import { LogSettings } from '@/shared/ui/charge-log/log-settings';
import { LogUnderstood } from '@/shared/ui/charge-log/log-understood';
import { canPickLog, onLogDropped, pickLog } from '@/shared/ui/charge-log/pick-log';
import { share } from '@/shared/ui/format/quantities';
import { Button } from '@/shared/ui/primitives/button';
import { CallOut } from '@/shared/ui/primitives/call-out';
import { Txt } from '@/shared/ui/primitives/txt';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';

/** A file that is chosen or dropped, what was understood of it, and how its columns are to be read. */
export function LogFileBody({
  charge,
  reading,
  offline,
  now,
}: {
  charge: ChargeDto;
  reading: ReturnType<typeof useChargeLog>;
  offline: boolean;
  now: number;
}) {
  const { log, preview, choices, sent, error, read } = reading;
  const wide = useBreakpoint() === 'wide';
  const dropped = useEffectEvent((picked: { name: string; file: Blob }) => {
    if (!offline) void read(picked, null);
  });
  useEffect(() => onLogDropped((picked) => dropped(picked)), []);
  const choose = async () => {
    const picked = await pickLog();
    if (picked !== null) await read(picked, null);
  };
  const change = (next: LogChoices) => {
    if (log !== null) void read(log, next);
  };
  return (
    <View style={{ rowGap: 16 }}>
      <Txt tone="ink2">
        {log === null
          ? `A CSV of up to a million lines with its time, and volts, amps, °C or the groups, in any order.${wide ? ' Choose it, or drop it anywhere here.' : ''} You see what was understood before anything is kept.`
          : log.name}
      </Txt>
      {canPickLog ? (
        <Button
          look={log === null ? 'primary' : 'line'}
          size={log === null ? 'normal' : 'small'}
          title={log === null ? 'Choose a file' : 'Choose another file'}
          onPress={() => void choose()}
          disabled={offline || (sent !== null && preview === null)}
        />
      ) : (
        <Txt>Files can be chosen in a browser only.</Txt>
      )}
      {offline ? <Txt kind="small">A file is read by the server: this needs the connection.</Txt> : null}
      {sent === null ? null : (
        <Txt kind="small" tone="ink2" role="status">
          {sent < 1 ? `On its way, ${share(sent)}` : 'It is being read'}
        </Txt>
      )}
      {error === null ? null : (
        <CallOut tone="red" announce>
          <Txt>{sentenceOf(error)}</Txt>
          {log === null ? null : (
            <Button
              look="line"
              size="small"
              title="Read it again"
              onPress={() => void read(log, choices)}
              disabled={offline || sent !== null}
            />
          )}
        </CallOut>
      )}
      {preview === null ? null : <LogUnderstood preview={preview} now={now} />}
      {preview === null || choices === null || choices.columns.length === 0 ? null : (
        <>
          <Txt kind="heading" heading={2}>
            How it is read
          </Txt>
          <LogSettings
            choices={choices}
            startedAt={Date.parse(charge.startedAt ?? charge.clipOnAt)}
            now={now}
            onChange={change}
          />
          <LogColumns
            columns={preview.columns}
            choices={choices}
            onChange={(columns) => change({ ...choices, columns })}
          />
        </>
      )}
    </View>
  );
}
