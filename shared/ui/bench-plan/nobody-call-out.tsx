import { View } from 'react-native';
import type { AlertDto } from '@/shared/contract/alert';
import type { BenchPlanDto, PlanLookInDto, PlanPersonDto } from '@/shared/contract/bench-plan';
import { firstName } from '../charge/card-model';
import { clock, moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { makeStyles } from '../theme/make-styles';
import { lookOf } from '../alerts/alert-words';

/** Who is free now, and until when; the one who is free longest leads. Not those it has been passed to already. */
export function freeNow(
  people: readonly PlanPersonDto[],
  now: number,
  besides: string | null,
): { person: PlanPersonDto['person']; until: number } | null {
  const free = people.flatMap(({ person, free: stretches }) =>
    stretches
      .filter(({ from, to }) => Date.parse(from) <= now && Date.parse(to) > now && person.id !== besides)
      .map(({ to }) => ({ person, until: Date.parse(to) })),
  );
  return free.sort((a, b) => b.until - a.until)[0] ?? null;
}

/** An alarm that nobody has taken: what was seen, who is free, and one tap that gives it to them. */
export function NobodyCallOut({
  alert,
  title,
  people,
  now,
  busy,
  offline,
  problem,
  onGive,
  onGo,
}: {
  alert: AlertDto;
  /** The charge: 'R-2406'. */
  title: string;
  people: readonly PlanPersonDto[];
  now: number;
  busy: boolean;
  offline: boolean;
  problem: string | null;
  onGive: (personId: string) => void;
  onGo: (path: string) => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const passedTo = alert.passedAt === null ? null : alert.for;
  const free = freeNow(people, now, passedTo?.id ?? null);
  const words = passedTo ? `${firstName(passedTo.name)} has been asked about ${title}` : `Nobody has ${title}`;
  return (
    <CallOut tone={alert.level === 'alarm' ? 'red' : 'amber'} label={words}>
      <View style={styles.head}>
        <View style={styles.tag}>
          <StageTag stage={lookOf(alert).mark} text={words} />
        </View>
        <Txt kind="numS" nowrap>
          {clock(Date.parse(alert.passedAt ?? alert.raisedAt), zone, marks)}
        </Txt>
      </View>
      <Txt style={styles.fact}>
        {[
          alert.seen,
          free
            ? `${firstName(free.person.name)} is free until ${moment(free.until, zone, now, marks)}.`
            : 'Nobody is free now.',
        ].join(' ')}
      </Txt>
      {problem ? (
        <Txt kind="small" bold tone="alarm" role="alert">
          {problem}
        </Txt>
      ) : null}
      {offline ? (
        <View nativeID="bench-give-it-why">
          <Txt kind="small" tone="ink2">
            Giving it to somebody needs the connection.
          </Txt>
        </View>
      ) : null}
      {free ? (
        <Button
          size="small"
          title={`Give it to ${firstName(free.person.name)}`}
          label={`Give ${title} to ${firstName(free.person.name)}`}
          busy={busy}
          disabled={offline}
          describedBy={offline ? 'bench-give-it-why' : undefined}
          onPress={() => onGive(free.person.id)}
        />
      ) : (
        <Button size="small" title="Open the alerts" onPress={() => onGo('/alerts')} />
      )}
    </CallOut>
  );
}

/** The look-ins still to come for which nobody is there, the soonest first. */
export const lookInsOfNobody = ({ charges }: Pick<BenchPlanDto, 'charges'>, now: number): PlanLookInDto[] =>
  charges
    .flatMap(({ lookIns }) => lookIns)
    .filter(({ person, doneAt, dueAt }) => person === null && doneAt === null && Date.parse(dueAt) >= now)
    .sort((a, b) => Date.parse(a.dueAt) - Date.parse(b.dueAt));

/** Look-ins that fall into a time in which nobody is there. */
export function LookInsCallOut({ lookIns, now }: { lookIns: readonly PlanLookInDto[]; now: number }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const [first, ...more] = lookIns;
  if (!first) return null;
  const rest = more.length === 0 ? '' : ` ${more.length} more after it.`;
  return (
    <CallOut tone="amber" label="Nobody is there to look in">
      <StageTag stage="check-due" text="Nobody is there to look in" />
      <Txt style={styles.fact}>
        {`${first.title} on ${first.channelName} asks for a look-in at ${moment(Date.parse(first.dueAt), zone, now, marks)}.${rest}`}
      </Txt>
    </CallOut>
  );
}

const useStyles = makeStyles(() => ({
  head: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    justifyContent: 'space-between',
    alignItems: 'center',
    columnGap: 12,
  },
  tag: { flexShrink: 1, minWidth: 0 },
  fact: { marginTop: 8, marginBottom: 10, lineHeight: 21 },
}));
