import { View } from 'react-native';
import { useFits } from '@/shared/client/bench-plan';
import { useCan, useMember } from '@/shared/client/session';
import type { PlanBlockDto } from '@/shared/contract/bench-plan';
import { moment } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { NBSP } from '@/shared/ui/format/marks';
import { Link } from '@/shared/ui/primitives/link';
import { Txt } from '@/shared/ui/primitives/txt';
import { makeStyles } from '@/shared/ui/theme/make-styles';
import { fitsTitle, minutesLeft } from '@/shared/ui/work/fit-words';
import { FillCard } from './fill-card';
import { FitList } from './fit-list';

const most = { fitting: 3, beside: 2 } as const;

/** The foot of the bench: one's fills that are still to come, and what fits the first own wait. */
export function BenchFits({
  now,
  later,
  onGo,
  onStale,
}: {
  now: number;
  /** Fills that are taken for later today. */
  later: readonly PlanBlockDto[];
  onGo: (path: string) => void;
  /** After an act: read the own day again. */
  onStale: () => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const me = useMember().person.id;
  const mayRead = useCan('work:read');
  const query = useFits(mayRead);
  const stretch = query.data?.people
    .find(({ person }) => person.id === me)
    ?.stretches.find(({ to }) => Date.parse(to) > now);
  const at = (ms: number) => moment(ms, zone, now, marks);
  const renew = () => {
    void query.refetch();
    onStale();
  };
  if (!mayRead) return null;
  return (
    <View role="region" aria-label="Other work" style={styles.part}>
      {later.map((fill) => (
        <FillCard key={fill.stint?.id} block={fill} now={now} onGo={onGo} onStale={renew} />
      ))}
      {stretch ? (
        <View>
          <View style={styles.head}>
            <Txt kind="label" heading={2} style={styles.title}>
              {fitsTitle(stretch, now, at)}
            </Txt>
            <Txt kind="small" tone="ink2" nowrap>
              {`${minutesLeft(stretch, now)}${NBSP}min free`}
            </Txt>
          </View>
          <FitList stretch={stretch} now={now} most={most} onStale={renew} />
        </View>
      ) : query.data ? (
        <Txt tone="ink2">You have no free stretch today or on your next day here.</Txt>
      ) : query.isError ? (
        <View>
          <Txt tone="ink2">What fits your waits could not be read.</Txt>
          <Link kind="small" title="read it again" onPress={() => void query.refetch()} />
        </View>
      ) : null}
      <View style={styles.ways}>
        <Link title="My day" href="/my-day" onPress={() => onGo('/my-day')} />
        <Link title="All other work" href="/work" onPress={() => onGo('/work')} />
      </View>
    </View>
  );
}

const useStyles = makeStyles(() => ({
  part: { paddingTop: 12, rowGap: 10 },
  head: { flexDirection: 'row', alignItems: 'baseline', justifyContent: 'space-between', columnGap: 12 },
  title: { fontSize: 15, flexShrink: 1 },
  ways: { flexDirection: 'row', columnGap: 24 },
}));
