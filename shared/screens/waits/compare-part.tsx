import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useCompareWaits } from '@/shared/client/waits';
import { Select } from '@/shared/ui/primitives/select';
import { Txt } from '@/shared/ui/primitives/txt';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';
import { Comparison } from '@/shared/ui/waits/comparison';
import { DaysFields } from '@/shared/ui/waits/days-fields';
import { comparisons, type Comparison as Compared } from '@/shared/ui/waits/wait-address';
import type { WaitAddressHeld } from './use-wait-address';

/** The period of the page against another one, of the same filters. */
export function ComparePart({ address }: { address: WaitAddressHeld }) {
  const { compare, compareDays, query, period, set, params, today } = address;
  const asked = useCompareWaits(query, compareDays);
  // 'As many weeks before' all time is no period.
  const options = Object.entries(comparisons).filter(
    ([value]) => period !== 'all' || value === 'none' || value === 'days',
  );
  return (
    <View style={{ rowGap: 12 }} role="region" aria-label="Compare two periods">
      <Txt kind="heading" heading={2}>
        Compare two periods
      </Txt>
      <Select<Compared>
        label="Compare with"
        size="low"
        value={compareDays === null && compare !== 'days' ? 'none' : compare}
        options={options.map(([value, label]) => ({ value: value as Compared, label }))}
        onChange={(value) =>
          set({
            compare: value === 'none' ? '' : value,
            cfrom: value === 'days' ? (compareDays?.from ?? '') : '',
            cto: value === 'days' ? (compareDays?.to ?? '') : '',
          })
        }
      />
      {compare === 'days' ? (
        <DaysFields
          from={params.cfrom ?? ''}
          to={params.cto ?? ''}
          latest={today}
          onDays={(cfrom, cto) => set({ cfrom, cto })}
        />
      ) : null}
      {compareDays === null ? null : asked.data ? (
        <Comparison found={asked.data} today={today} />
      ) : asked.isError ? (
        <ErrorState
          failed="The periods could not be compared."
          toDo={sentenceOf(asked.error)}
          action={{ title: 'Try again', onPress: () => void asked.refetch(), busy: asked.isFetching }}
        />
      ) : (
        <Loading what="the comparison" onRetry={() => void asked.refetch()} />
      )}
    </View>
  );
}
