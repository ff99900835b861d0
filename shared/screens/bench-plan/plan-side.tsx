import { View } from 'react-native';
import { isOpen, useAlerts } from '@/shared/client/alerts';
import { useFits, useProposal, useStartNow } from '@/shared/client/bench-plan';
import { useMember } from '@/shared/client/session';
import type { BenchPlanDto } from '@/shared/contract/bench-plan';
import { firstName } from '@/shared/ui/charge/card-model';
import { FitsPart } from '@/shared/ui/bench-plan/fits-part';
import { LastChangePart } from '@/shared/ui/bench-plan/last-change-part';
import { LookInsCallOut, lookInsOfNobody, NobodyCallOut } from '@/shared/ui/bench-plan/nobody-call-out';
import { ProposalPart } from '@/shared/ui/bench-plan/proposal-part';
import { QueuePart } from '@/shared/ui/bench-plan/queue-part';
import { StartNowPart } from '@/shared/ui/bench-plan/start-now-part';
import { WaitsTodayPart } from '@/shared/ui/bench-plan/waits-today-part';
import { makeStyles } from '@/shared/ui/theme/make-styles';
import type { Acts } from './use-acts';
import type { Move } from './use-move';

export interface PlanSideProps {
  plan: BenchPlanDto;
  now: number;
  offline: boolean;
  acts: Acts;
  move: Move;
  /** Whose wait is shown; null: the soonest one in which something fits. */
  person: string | null;
  onPerson: (personId: string) => void;
  onGo: (path: string) => void;
}

/** What needs somebody now: an alarm that nobody has, look-ins for which nobody is there, and a better plan. */
export function UrgentParts({ plan, now, offline, acts, move, onGo }: PlanSideProps) {
  const styles = useStyles();
  const alerts = useAlerts().data ?? [];
  const proposal = useProposal().data ?? null;
  const alarm = alerts
    .filter((alert) => isOpen(alert) && alert.level === 'alarm')
    .sort((a, b) => Date.parse(a.raisedAt) - Date.parse(b.raisedAt))[0];
  const lookIns = lookInsOfNobody(plan, now);
  const title = plan.charges.find(({ card }) => card.id === alarm?.chargeId)?.card.title;
  if (!alarm && lookIns.length === 0 && !proposal) return null;
  return (
    <View style={styles.stack}>
      {alarm ? (
        <NobodyCallOut
          alert={alarm}
          title={title ?? alarm.title}
          people={plan.people}
          now={now}
          busy={acts.passBusy}
          offline={offline}
          problem={acts.passProblem}
          onGive={(personId) => acts.passAlert(alarm.id, personId)}
          onGo={onGo}
        />
      ) : null}
      {lookIns.length > 0 ? <LookInsCallOut lookIns={lookIns} now={now} /> : null}
      {proposal ? (
        <ProposalPart
          proposal={proposal}
          now={now}
          busy={acts.takeBusy}
          offline={offline}
          problem={acts.takeProblem}
          onTake={() => acts.takePlan(proposal.id)}
          onByHand={move.pick}
        />
      ) : null}
    </View>
  );
}

/** The queue, what fits the waits, what could be started now, the waits of today, and the last change. */
export function PlanSide({ plan, now, offline, acts, move, person, onPerson, onGo }: PlanSideProps) {
  const styles = useStyles();
  const { person: me } = useMember();
  const proposal = useProposal();
  const fits = useFits().data;
  const startNow = useStartNow().data ?? [];
  return (
    <View style={styles.stack}>
      <QueuePart
        queue={plan.queue}
        now={now}
        picked={move.subject?.chargeId ?? null}
        noBetter={proposal.data === null}
        first
        onPick={move.pick}
      />
      {fits ? (
        <FitsPart
          fits={fits}
          person={person}
          now={now}
          meId={me.id}
          busy={acts.giving}
          offline={offline}
          problem={acts.gaveProblem}
          onPerson={onPerson}
          onGive={(fit, personId) => {
            const to = fits.people.find((one) => one.person.id === personId);
            acts.give(fit, personId, to ? firstName(to.person.name) : '');
          }}
        />
      ) : null}
      {startNow.length > 0 ? <StartNowPart rows={startNow} onGo={onGo} /> : null}
      <WaitsTodayPart waits={plan.waitsToday} />
      {plan.lastChange ? (
        <LastChangePart
          change={plan.lastChange}
          now={now}
          busy={acts.undoBusy}
          offline={offline}
          problem={acts.undoProblem}
          onUndo={() => plan.lastChange && acts.takeBack(plan.lastChange)}
        />
      ) : null}
    </View>
  );
}

const useStyles = makeStyles(() => ({ stack: { rowGap: 14 } }));
