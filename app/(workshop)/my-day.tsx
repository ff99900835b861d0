import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useMyDay } from '@/shared/client/bench-plan';
import { useNow } from '@/shared/client/clock';
import { useGate } from '@/shared/client/gate';
import { useLink } from '@/shared/client/link';
import { useSaveDaySheet } from '@/shared/client/papers';
import type { MyDayDto } from '@/shared/contract/bench-plan';
import { DayList } from '@/shared/screens/my-day/day-list';
import { DayWalk } from '@/shared/ui/bench-plan/day-walk';
import { clock, dateLong } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { EN_DASH } from '@/shared/ui/format/marks';
import { dayOf, instantOfDay } from '@/shared/ui/format/zone';
import { IconButton } from '@/shared/ui/primitives/icon-button';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const noon = 12 * 60;

/** What one person has to do on a day, in the order of time; `?day=` another day than today. */
export default function MyDay() {
  const router = useRouter();
  const params = useLocalSearchParams<{ day?: string }>();
  const { zone, marks } = useFormats();
  const now = useNow(30_000);
  const today = dayOf(now, zone);
  const named = params.day && /^\d{4}-\d\d-\d\d$/.test(params.day) ? params.day : null;
  const day = named ?? today;
  const gate = useGate('work:read');
  const offline = useLink().state === 'down';
  // Null is today, also past midnight.
  const query = useMyDay(named === today ? null : named);
  const sheet = useSaveDaySheet(day);
  const hours = query.data ? hoursOf(query.data, (ms) => clock(ms, zone, marks)) : null;
  return (
    <Screen
      single
      header={
        <HeaderBar
          title="My day"
          sub={[dateLong(instantOfDay(day, noon, zone), zone), hours].filter(Boolean).join(' · ')}
          clock={clock(now, zone, marks)}
          tools={
            query.data ? (
              <IconButton
                icon="print"
                label="Save the day sheet for printing"
                disabled={sheet.isPending || offline}
                onPress={() => sheet.save(marks.decimal)}
              />
            ) : undefined
          }
        />
      }
    >
      {!gate.may ? (
        <Forbidden what="A day of the bench plan is seen" roles={gate.roles} people={gate.people} />
      ) : (
        <View style={{ rowGap: 8 }}>
          <DayWalk
            day={day}
            days={1}
            today={today}
            onGo={(next) => router.setParams({ day: next === today ? '' : next })}
          />
          {sheet.isError ? (
            <Txt bold tone="alarm" role="alert">
              {`The day sheet could not be made. ${sentenceOf(sheet.error)}`}
            </Txt>
          ) : null}
          {query.data ? (
            <DayList
              day={query.data}
              now={now}
              today={today}
              onGo={(path) => router.push(path as Href)}
              onStale={() => void query.refetch()}
            />
          ) : query.isError ? (
            <ErrorState
              failed="Your day could not be read."
              safe="The charges go on as they were set."
              toDo={sentenceOf(query.error)}
              action={{ title: 'Try again', onPress: () => void query.refetch(), busy: query.isFetching }}
            />
          ) : (
            <Loading what="your day" rows={6} onRetry={() => void query.refetch()} />
          )}
        </View>
      )}
    </Screen>
  );
}

/** '08:00–17:00'; null on a day that one is not there. */
function hoursOf({ present }: MyDayDto, at: (ms: number) => string): string | null {
  const [first, last] = [present[0], present.at(-1)];
  return first && last ? `${at(Date.parse(first.from))}${EN_DASH}${at(Date.parse(last.to))}` : null;
}
