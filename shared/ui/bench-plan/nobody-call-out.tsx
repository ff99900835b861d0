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

/** The look-ins still to come that nobody can do, the soonest first. */
export const lookInsOfNobody = ({ charges }: Pick<BenchPlanDto, 'charges'>, now: number): PlanLookInDto[] =>
  charges
    .flatMap(({ lookIns }) => lookIns)
    .filter(({ person, doneAt, dueAt }) => person === null && doneAt === null && Date.parse(dueAt) >= now)
    .sort((a, b) => Date.parse(a.dueAt) - Date.parse(b.dueAt));

/** The first look-in for each reason, and how many more have the same. */
function byReason(lookIns: readonly PlanLookInDto[]): { first: PlanLookInDto; more: number }[] {
  const reasons = new Map<string, { first: PlanLookInDto; more: number }>();
  for (const one of lookIns) {
    const known = reasons.get(one.nobody?.because ?? '');
    if (known) known.more += 1;
    else reasons.set(one.nobody?.because ?? '', { first: one, more: 0 });
  }
  return [...reasons.values()];
}

/** So many reasons are told; what is left is counted. */
const MOST_REASONS = 3;

/** Look-ins that nobody can do, each with why: nobody is there, or whoever is has their hands in something. */
export function LookInsCallOut({ lookIns, now }: { lookIns: readonly PlanLookInDto[]; now: number }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  if (lookIns.length === 0) return null;
  const reasons = byReason(lookIns);
  const untold = reasons.slice(MOST_REASONS).reduce((sum, { more }) => sum + 1 + more, 0);
  const words = lookIns.some(({ nobody }) => nobody?.kind !== 'busy')
    ? 'Nobody is there to look in'
    : 'Nobody is free to look in';
  return (
    <CallOut tone="amber" label={words}>
      <StageTag stage="check-due" text={words} />
      {reasons.slice(0, MOST_REASONS).map(({ first, more }) => (
        <Txt key={`${first.chargeId}-${first.dueAt}`} style={styles.fact}>
          {[
            `${first.title} on ${first.channelName} asks for a look-in at ${moment(Date.parse(first.dueAt), zone, now, marks)}.`,
            ...(first.nobody ? [first.nobody.because] : []),
            ...(more > 0 ? [`So it is with ${more} more after it.`] : []),
          ].join(' ')}
        </Txt>
      ))}
      {untold > 0 ? <Txt tone="ink2">{`${untold} more after them.`}</Txt> : null}
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
