import { useState } from 'react';
import { View } from 'react-native';
import { useLink } from '@/shared/client/link';
import { useModuleTypes } from '@/shared/client/module-types';
import { useReplay } from '@/shared/client/replays';
import { saveFile } from '@/shared/client/save-file';
import type { ShelfDto } from '@/shared/contract/waits-replay';
import { Button } from '@/shared/ui/primitives/button';
import { Select } from '@/shared/ui/primitives/select';
import { Txt } from '@/shared/ui/primitives/txt';
import { tooFewWords } from '@/shared/ui/waits/replay-words';
import { ShelfCurve } from '@/shared/ui/waits/shelf-curve';
import { ReplayState } from './replay-state';
import type { WaitAddressHeld } from './use-wait-address';

function saveCurve({ curve, moduleTypeId }: ShelfDto): void {
  const lines = [
    ['Shelf volts of a group', 'On the charger, min'],
    ...curve.map((one) => [one.volts, one.meanMinutes]),
  ];
  const text = lines.map((line) => line.join(',')).join('\r\n');
  saveFile(new Blob([`${text}\r\n`], { type: 'text/csv' }), `shelf-voltage-${moduleTypeId}.csv`);
}

/** At which voltage spares of a type would have waited least for the targets there were. */
export function ShelfPart({ address }: { address: WaitAddressHeld }) {
  const { from, to, moduleTypeId } = address.query;
  const types = useModuleTypes().data ?? [];
  const replay = useReplay('shelf');
  const down = useLink().state === 'down';
  const [chosen, setChosen] = useState<string | null>(null);
  const [askedFor, setAskedFor] = useState('');
  const typeId = chosen ?? moduleTypeId ?? null;
  const asked = `${from} ${to} ${typeId}`;
  const found = replay.job?.state === 'done' && askedFor === asked ? replay.job.shelf : null;
  const why = down
    ? 'No connection: the curve is reckoned by the server.'
    : typeId === null
      ? 'Choose a module type.'
      : null;
  return (
    <View style={{ rowGap: 10 }} role="region" aria-label="Shelf voltage">
      <Txt kind="heading" heading={2}>
        Shelf voltage
      </Txt>
      <Select
        label="Spares of"
        size="low"
        empty="Choose a module type"
        value={typeId}
        options={types.map(({ id, name }) => ({ value: id, label: name }))}
        onChange={setChosen}
      />
      {found ? (
        found.enough ? (
          <ShelfCurve shelf={found} onCsv={() => saveCurve(found)} />
        ) : (
          <Txt tone="ink2">{tooFewWords(found)}</Txt>
        )
      ) : null}
      <ReplayState replay={replay} />
      {why ? (
        <Txt kind="small" tone="ink2" nativeID="shelf-why">
          {why}
        </Txt>
      ) : null}
      <Button
        look="line"
        size="small"
        title="Find the shelf voltage"
        disabled={why !== null}
        {...(why ? { describedBy: 'shelf-why' } : {})}
        busy={replay.busy}
        onPress={() => {
          if (typeId === null) return;
          setAskedFor(asked);
          replay.begin({ from, to, moduleTypeId: typeId });
        }}
      />
    </View>
  );
}
