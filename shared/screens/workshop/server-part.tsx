import { useState } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useGate } from '@/shared/client/gate';
import { useLink } from '@/shared/client/link';
import { partState } from '@/shared/client/part-state';
import { useBackUp, useExport, useStatus } from '@/shared/client/status';
import { UndeliveredPart } from '@/shared/screens/alerts/undelivered-part';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { dayOf } from '@/shared/ui/format/zone';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { CallOut } from '@/shared/ui/primitives/call-out';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { SectionBlock } from '@/shared/ui/workshop/section-block';
import { copiesWarning, CopiesTable, StatusFacts } from '@/shared/ui/workshop/status-facts';
import type { PartProps } from './part-props';

/** Version, copies and export of everything, or who sees them. */
export function ServerPart({ titled }: PartProps) {
  const gate = useGate('workshop:write');
  return gate.may ? (
    <ServerFacts titled={titled} />
  ) : (
    <SectionBlock id="server" title="Server" titled={titled} state="ready" what="the server" onRetry={() => {}}>
      {titled ? (
        <Txt tone="ink2">{whoMay(gate, 'Seen')}</Txt>
      ) : (
        <Forbidden what="The server, its copies and the export are seen" roles={gate.roles} people={gate.people} />
      )}
    </SectionBlock>
  );
}

function ServerFacts({ titled }: PartProps) {
  const offline = useLink().state === 'down';
  const now = useNow(30_000);
  const { zone } = useFormats();
  const toast = useToast();
  const status = useStatus();
  const backUp = useBackUp();
  const save = useExport();
  const [asked, setAsked] = useState(false);
  const warning = status.data ? copiesWarning(status.data) : null;
  return (
    <SectionBlock
      id="server"
      title="Server"
      titled={titled}
      state={partState(status)}
      what="the server"
      onRetry={() => void status.refetch()}
    >
      {status.data ? (
        <>
          {warning ? (
            <CallOut tone="amber" label="The copies">
              <Txt bold>{warning}</Txt>
            </CallOut>
          ) : null}
          {status.data.outbox.dead > 0 ? <UndeliveredPart now={now} offline={offline} /> : null}
          <StatusFacts status={status.data} now={now} />
          <CopiesTable status={status.data} now={now} />
          <ProblemLine text={backUp.error ? sentenceOf(backUp.error) : null} />
          <ProblemLine text={save.error ? sentenceOf(save.error) : null} />
          <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: 12 }}>
            <Button
              look="line"
              title="Make a copy now"
              busy={backUp.isPending}
              onPress={() => backUp.mutate(undefined, { onSuccess: () => toast({ text: 'The data was copied.' }) })}
            />
            <Button look="line" title="Export everything" busy={save.isPending} onPress={() => setAsked(true)} />
          </View>
          <ConfirmSheet
            open={asked}
            title="Export everything?"
            fact="A ZIP of every table as JSON and CSV, with all photos, is saved on this device. Names and contacts of customers are in it."
            confirm="Export"
            safe="Leave it"
            busy={save.isPending}
            onClose={() => setAsked(false)}
            onConfirm={() => {
              save.mutate(dayOf(now, zone), { onSettled: () => setAsked(false) });
            }}
          />
        </>
      ) : null}
    </SectionBlock>
  );
}
