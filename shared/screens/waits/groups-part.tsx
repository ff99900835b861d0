import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useWaitGroups } from '@/shared/client/waits';
import type { WaitDimension } from '@/shared/contract/waits';
import { Link } from '@/shared/ui/primitives/link';
import { SegmentSwitch } from '@/shared/ui/primitives/segment-switch';
import { Select } from '@/shared/ui/primitives/select';
import { Txt } from '@/shared/ui/primitives/txt';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';
import { makeStyles } from '@/shared/ui/theme/make-styles';
import { GroupTable } from '@/shared/ui/waits/group-table';
import { keyOfDimension } from '@/shared/ui/waits/wait-address';
import { dimensionNames } from '@/shared/contract/wait-names';
import type { Csv } from './use-csv';
import type { WaitAddressHeld } from './use-wait-address';

const planNote =
  'Later (+) or sooner (−) than planned, on average and in the middle; half of the charges were off by less than the next figure; 80 % inside the band is the aim.';

/** The waits parted by whatever one wants to know them by, and the plan held against what came. */
export function GroupsPart({ address, csv }: { address: WaitAddressHeld; csv: Csv }) {
  const styles = useStyles();
  const { by, show, query, set } = address;
  const asked = useWaitGroups(by, query);
  // While another dimension comes, the last one stands under the wrong heading.
  const groups = asked.data?.by === by ? asked.data.groups : undefined;
  const save = csv.of(by);
  return (
    <View style={styles.part}>
      <View style={styles.head}>
        <Txt kind="heading" heading={2} style={styles.words}>
          {show === 'plan' ? 'Planned against actual' : 'Waits, parted'}
        </Txt>
        {save ? (
          <Link
            kind="small"
            tight
            align="right"
            title="CSV"
            label={`Waits by ${dimensionNames[by].toLowerCase()}, as a CSV file`}
            onPress={save}
          />
        ) : null}
      </View>
      <View style={styles.choices}>
        <View style={styles.by}>
          <Select<WaitDimension>
            label="By"
            size="low"
            value={by}
            options={Object.entries(dimensionNames).map(([value, label]) => ({
              value: value as WaitDimension,
              label,
            }))}
            onChange={(next) => set({ by: next })}
          />
        </View>
        <SegmentSwitch
          label="What the table shows"
          fit="words"
          value={show}
          segments={[
            { value: 'wait', label: 'Waits' },
            { value: 'plan', label: 'Against the plan' },
          ]}
          onChange={(next) => set({ show: next === 'plan' ? 'plan' : '' })}
        />
      </View>
      {show === 'plan' ? (
        <Txt kind="small" tone="ink2">
          {planNote}
        </Txt>
      ) : null}
      {groups ? (
        <GroupTable
          by={by}
          show={show}
          groups={groups}
          onGroup={(key) => address.go(address.chargesHref({ [keyOfDimension[by]]: key }))}
        />
      ) : asked.isError ? (
        <ErrorState
          failed="This table could not be read."
          toDo={sentenceOf(asked.error)}
          action={{ title: 'Try again', onPress: () => void asked.refetch(), busy: asked.isFetching }}
        />
      ) : (
        <Loading what="the table" onRetry={() => void asked.refetch()} />
      )}
    </View>
  );
}

const useStyles = makeStyles(() => ({
  part: { rowGap: 10 },
  head: { flexDirection: 'row', alignItems: 'center', columnGap: 16 },
  words: { flex: 1 },
  choices: { flexDirection: 'row', flexWrap: 'wrap', columnGap: 12, rowGap: 12, alignItems: 'flex-end' },
  by: { flexGrow: 1, flexBasis: 150, maxWidth: 240 },
}));
