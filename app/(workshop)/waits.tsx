import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { lazy, Suspense, useState } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useChargers } from '@/shared/client/chargers';
import { useNow } from '@/shared/client/clock';
import { useModuleTypes } from '@/shared/client/module-types';
import { usePeople } from '@/shared/client/people';
import { useCan } from '@/shared/client/session';
import { downloadWaits, useWaitCharges, useWaitGroups, useWaits } from '@/shared/client/waits';
import { can } from '@/shared/contract/roles';
import { clock, moment } from '@/shared/ui/format/clock';
import { durationTable } from '@/shared/ui/format/duration';
import { useFormats } from '@/shared/ui/format/formats';
import { addDays, dayOf } from '@/shared/ui/format/zone';
import { Button } from '@/shared/ui/primitives/button';
import { Rule } from '@/shared/ui/primitives/rule';
import { Select } from '@/shared/ui/primitives/select';
import { Table } from '@/shared/ui/primitives/table';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { Loading } from '@/shared/ui/states/loading';
import { makeStyles } from '@/shared/ui/theme/make-styles';
import { fewCharges, WaitFigures } from '@/shared/ui/waits/wait-figures';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const WeekChart = lazy(() => import('@/shared/ui/waits/wait-charts').then((part) => ({ default: part.WeekChart })));
const StageRibbon = lazy(() => import('@/shared/ui/waits/wait-charts').then((part) => ({ default: part.StageRibbon })));
const GroupTable = lazy(() => import('@/shared/ui/waits/wait-charts').then((part) => ({ default: part.GroupTable })));

const periods = { '4': '4 weeks', '8': '8 weeks', '13': '13 weeks', '26': '26 weeks' } as const;
type Period = keyof typeof periods;

/** Where the hours of waiting go. */
export default function Waits() {
  return useCan('waits:read') ? <WaitsPage /> : <NotForYou />;
}

function NotForYou() {
  const people = usePeople().data ?? [];
  return (
    <Screen header={<HeaderBar title="Waits" />}>
      <Forbidden
        what="Waiting statistics are read"
        roles="a foreman or a manager"
        people={people.filter((person) => can(person.role, 'waits:read')).map((person) => person.name)}
      />
    </Screen>
  );
}

function WaitsPage() {
  const styles = useStyles();
  const router = useRouter();
  const params = useLocalSearchParams<{ weeks?: string; type?: string; charger?: string }>();
  const { zone, marks } = useFormats();
  const now = useNow(60_000);
  const weeks: Period = params.weeks && params.weeks in periods ? (params.weeks as Period) : '8';
  const today = dayOf(now, zone);
  // Weeks from Monday on; the present one is the last of them.
  const weekday = (new Date(`${today}T00:00:00Z`).getUTCDay() + 6) % 7;
  const query = {
    from: addDays(today, -weekday - 7 * (Number(weeks) - 1)),
    to: today,
    ...(params.type ? { moduleTypeId: params.type } : {}),
    ...(params.charger ? { chargerId: params.charger } : {}),
  };
  const waits = useWaits(query);
  const byCharger = useWaitGroups('charger', query).data?.groups ?? [];
  const rows = useWaitCharges(query).data?.rows ?? [];
  const types = useModuleTypes().data ?? [];
  const chargers = useChargers().data ?? [];
  const [csvProblem, setCsvProblem] = useState<string | null>(null);
  const filter = (change: { weeks?: string; type?: string; charger?: string }) =>
    router.setParams({ weeks, type: params.type ?? '', charger: params.charger ?? '', ...change });
  const csv = () => {
    setCsvProblem(null);
    downloadWaits(query).catch((error: unknown) => setCsvProblem(sentenceOf(error)));
  };
  const data = waits.data;
  return (
    <Screen
      header={
        <HeaderBar
          title="Waits"
          sub={data ? `${data.charges} charges` : undefined}
          clock={clock(now, zone, marks)}
          action={<Button title="CSV" look="line" size="small" icon="download" onPress={csv} />}
        />
      }
    >
      <View style={styles.page}>
        <View style={styles.filters}>
          <View style={styles.filter}>
            <Select
              label="Period"
              size="low"
              value={weeks}
              options={Object.entries(periods).map(([value, label]) => ({ value, label }))}
              onChange={(value) => filter({ weeks: value })}
            />
          </View>
          <View style={styles.filter}>
            <Select
              label="Module type"
              size="low"
              value={params.type || 'all'}
              options={[
                { value: 'all', label: 'All types' },
                ...types.map((type) => ({ value: type.id, label: type.name })),
              ]}
              onChange={(value) => filter({ type: value === 'all' ? '' : value })}
            />
          </View>
          <View style={styles.filter}>
            <Select
              label="Charger"
              size="low"
              value={params.charger || 'all'}
              options={[
                { value: 'all', label: 'All chargers' },
                ...chargers.map((charger) => ({ value: charger.id, label: charger.name })),
              ]}
              onChange={(value) => filter({ charger: value === 'all' ? '' : value })}
            />
          </View>
        </View>
        {csvProblem ? (
          <Txt tone="alarm" role="alert">
            {csvProblem}
          </Txt>
        ) : null}
        {data ? (
          data.charges === 0 ? (
            <Empty
              sentence="No charge was finished in this time."
              action={{ title: 'To the bench', onPress: () => router.navigate('/bench' as Href) }}
            />
          ) : (
            <>
              {data.charges < fewCharges ? (
                <Txt tone="ink2">{`Only ${data.charges} charges: middle values say little under ${fewCharges}.`}</Txt>
              ) : null}
              <WaitFigures waits={data} today={today} />
              <Suspense fallback={<View style={{ height: 240 }} />}>
                <WeekChart waits={data} onCsv={csv} />
                <Rule gap={0} />
                <StageRibbon stages={data.stages} />
                <GroupTable label="Waits by module type" first="Module type" groups={data.byModuleType} />
                <GroupTable label="Waits by charger" first="Charger" groups={byCharger} />
              </Suspense>
              <Txt kind="heading" heading={2}>
                The charges behind it
              </Txt>
              <Table
                label="Charges"
                rows={rows}
                rowKey={(row) => row.chargeId}
                rowLabel={(row) => `Open ${row.title}`}
                onOpen={(row) => router.push(`/charges/${row.chargeId}` as Href)}
                columns={[
                  { key: 'title', title: 'Charge', phone: 'name', cell: (row) => row.title },
                  { key: 'type', title: 'Module type', phone: 'detail', share: 1.4, cell: (row) => row.typeName },
                  { key: 'charger', title: 'Charger', phone: 'none', cell: (row) => row.chargerName },
                  {
                    key: 'ready',
                    title: 'Ready',
                    numeric: true,
                    phone: 'none',
                    share: 1.2,
                    cell: (row) => moment(Date.parse(row.readyAt), zone, now, marks),
                  },
                  {
                    key: 'planned',
                    title: 'Planned',
                    numeric: true,
                    phone: 'none',
                    cell: (row) => durationTable(row.plannedS, 'minute'),
                  },
                  {
                    key: 'actual',
                    title: 'Took',
                    numeric: true,
                    phone: 'none',
                    cell: (row) => durationTable(row.actualS, 'minute'),
                  },
                  {
                    key: 'wait',
                    title: 'Wait',
                    numeric: true,
                    phone: 'value',
                    cell: (row) => durationTable(row.waitS, 'minute'),
                  },
                  {
                    key: 'inside',
                    title: 'In its band',
                    phone: 'none',
                    cell: (row) => (row.insideBand ? 'yes' : 'no'),
                  },
                ]}
              />
              {data.charges > 100 ? (
                <Txt kind="small" tone="ink2">{`The latest 100 of ${data.charges}. All of them are in the CSV.`}</Txt>
              ) : null}
            </>
          )
        ) : waits.isError ? (
          <ErrorState
            failed="The waits could not be read."
            toDo={sentenceOf(waits.error)}
            action={{ title: 'Try again', onPress: () => void waits.refetch(), busy: waits.isFetching }}
          />
        ) : (
          <Loading what="the waits" onRetry={() => void waits.refetch()} />
        )}
      </View>
    </Screen>
  );
}

const useStyles = makeStyles(() => ({
  page: { rowGap: 24, paddingTop: 8 },
  filters: { flexDirection: 'row', flexWrap: 'wrap', columnGap: 12, rowGap: 12 },
  filter: { flexGrow: 1, flexBasis: 150, maxWidth: 360 },
}));
