import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useWaitCharges } from '@/shared/client/waits';
import { Button } from '@/shared/ui/primitives/button';
import { Txt } from '@/shared/ui/primitives/txt';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';
import { ChargeRows } from '@/shared/ui/waits/charge-rows';
import { chargesWord } from '@/shared/ui/waits/wait-words';
import type { WaitAddressHeld } from './use-wait-address';

/** Rows under the figures; all of them stand on a page of their own. */
const SHOWN = 10;

/** The newest charges of the page's filters, and the way to all of them. */
export function ChargesPart({ address, count }: { address: WaitAddressHeld; count: number }) {
  const asked = useWaitCharges(address.query);
  const rows = asked.data?.pages[0]?.rows.slice(0, SHOWN);
  return (
    <View style={{ rowGap: 10 }}>
      <Txt kind="heading" heading={2}>
        The charges behind it
      </Txt>
      {rows ? (
        <>
          <ChargeRows rows={rows} now={address.now} onOpen={(id) => address.go(`/charges/${id}`)} />
          {count > rows.length ? (
            <View style={{ alignItems: 'flex-start' }}>
              <Button
                look="line"
                size="small"
                title={`All ${chargesWord(count)}`}
                onPress={() => address.go(address.chargesHref({ week: '' }))}
              />
            </View>
          ) : null}
        </>
      ) : asked.isError ? (
        <ErrorState
          failed="The charges could not be read."
          toDo={sentenceOf(asked.error)}
          action={{ title: 'Try again', onPress: () => void asked.refetch(), busy: asked.isFetching }}
        />
      ) : (
        <Loading what="the charges" onRetry={() => void asked.refetch()} />
      )}
    </View>
  );
}
