import { useState } from 'react';
import { View } from 'react-native';
import { useLink } from '@/shared/client/link';
import { useSaveHandOver } from '@/shared/client/papers';
import type { AdvisedDto, RepairDto } from '@/shared/contract/repair';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { Txt } from '@/shared/ui/primitives/txt';
import { AdvisedPart } from '@/shared/ui/repair/advised-part';
import { problemOfAct } from './act-problem';
import { AdvisedSheet } from './advised-sheet';

/** What goes to the owner: what was advised, with the sheet as a PDF. */
export function HandOverPart({ repair, now, mayWrite }: { repair: RepairDto; now: number; mayWrite: boolean }) {
  const { marks } = useFormats();
  const offline = useLink().state === 'down';
  const paper = useSaveHandOver(repair);
  const [sheet, setSheet] = useState<{ item: AdvisedDto | null } | null>(null);
  const write = mayWrite && !offline && (repair.state === 'open' || repair.state === 'handed-over');
  const problem = problemOfAct(paper.error);
  return (
    <View style={{ rowGap: 14 }}>
      <AdvisedPart
        advised={repair.advised}
        now={now}
        onAdd={write ? () => setSheet({ item: null }) : null}
        onChange={write ? (item) => setSheet({ item }) : null}
      />
      <Button
        look="line"
        icon="download"
        title="Hand-over sheet as PDF"
        busy={paper.isPending}
        disabled={offline}
        describedBy={offline ? 'hand-over-offline' : undefined}
        onPress={() => paper.save(marks.decimal)}
      />
      {offline ? (
        <Txt kind="small" tone="ink2" nativeID="hand-over-offline">
          No connection: the sheet is drawn when it is back.
        </Txt>
      ) : null}
      {problem ? (
        <Txt kind="label" tone="alarm" role="alert">
          {problem}
        </Txt>
      ) : null}
      {sheet ? <AdvisedSheet repair={repair} item={sheet.item} onClose={() => setSheet(null)} /> : null}
    </View>
  );
}
