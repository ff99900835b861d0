import { useState } from 'react';
import { View } from 'react-native';
import { useGate } from '@/shared/client/gate';
import { useEraseCustomer, useSaveCustomerData } from '@/shared/client/repairs';
import type { RepairDto } from '@/shared/contract/repair';
import { dateLong } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { Txt } from '@/shared/ui/primitives/txt';
import { problemOfAct } from './act-problem';
import { ReasonSheet } from './reason-sheet';

/** What a manager can do with the data of a customer; others see only that it was erased. */
export function CustomerPart({ repair, offline }: { repair: RepairDto; offline: boolean }) {
  const gate = useGate('customer:data');
  const { zone } = useFormats();
  const [asking, setAsking] = useState(false);
  const erase = useEraseCustomer();
  const save = useSaveCustomerData();
  const named = repair.customerName !== null || repair.customerContact !== null;
  const { erased } = repair;
  const problem = problemOfAct(save.error);
  if (!erased && !(gate.may && named)) return null;
  return (
    <View style={{ rowGap: 8 }}>
      <Txt kind="heading" heading={2}>
        Customer’s data
      </Txt>
      {erased ? (
        <Txt tone="ink2">
          {`Erased ${dateLong(Date.parse(erased.at), zone)}, ${erased.by.name}: ${erased.reason.replace(/\.$/, '')}.`}
        </Txt>
      ) : null}
      {gate.may && named ? (
        <>
          <View style={{ flexDirection: 'row', flexWrap: 'wrap', columnGap: 16, rowGap: 8 }}>
            <Button
              look="line"
              size="small"
              icon="download"
              title="Save as a file"
              disabled={offline}
              describedBy={offline ? 'customer-why' : undefined}
              busy={save.isPending}
              onPress={() => save.mutate(repair.id)}
            />
            <Button
              look="danger"
              size="small"
              title="Erase it"
              disabled={offline}
              describedBy={offline ? 'customer-why' : undefined}
              onPress={() => setAsking(true)}
            />
          </View>
          {offline ? (
            <Txt kind="small" tone="ink2" nativeID="customer-why">
              No connection: this waits until it is back.
            </Txt>
          ) : null}
        </>
      ) : null}
      {problem ? (
        <Txt kind="label" tone="alarm" role="alert">
          {problem}
        </Txt>
      ) : null}
      {asking ? (
        <ReasonSheet
          title="Erase the customer’s data"
          fact="Name and contact go from all repairs of this customer, from their notes and from the log. Readings, charges and photos stay: remove first the photos that show the customer. It cannot be taken back, and a backup made before still holds it."
          confirm="Erase name and contact"
          safe="Keep it"
          draft={`repair.erase.${repair.id}`}
          busy={erase.isPending}
          error={erase.error}
          onConfirm={(reason, done) => erase.mutate({ id: repair.id, reason }, { onSuccess: done })}
          onClose={() => setAsking(false)}
        />
      ) : null}
    </View>
  );
}
