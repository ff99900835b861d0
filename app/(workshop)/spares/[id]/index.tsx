import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { View } from 'react-native';
import { isConflict, isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useBoard } from '@/shared/client/board';
import { useNow } from '@/shared/client/clock';
import { useDraft } from '@/shared/client/drafts';
import { useGate } from '@/shared/client/gate';
import { useLink } from '@/shared/client/link';
import { useMeters } from '@/shared/client/meters';
import { useModuleTypes } from '@/shared/client/module-types';
import { useQuarantineSpare, useReleaseSpare, useSpare, useSpareHistory } from '@/shared/client/spares';
import type { SpareDto } from '@/shared/contract/spare';
import { CapacityFinding } from '@/shared/screens/spare/capacity-finding';
import { moment } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { Link } from '@/shared/ui/primitives/link';
import { Rule } from '@/shared/ui/primitives/rule';
import { Txt } from '@/shared/ui/primitives/txt';
import { CapacityHistory } from '@/shared/ui/spare/capacity-history';
import { Columns } from '@/shared/ui/screen/columns';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { noQuarantineDraft, QuarantineSheet, type QuarantineInput } from '@/shared/ui/spare/quarantine-sheet';
import { ReadingsHistory } from '@/shared/ui/spare/readings-history';
import { SpareCapacity } from '@/shared/ui/spare/spare-capacity';
import { SpareCharges } from '@/shared/ui/spare/spare-charges';
import { blockedBecause, SpareFoot, type SpareAct } from '@/shared/ui/spare/spare-foot';
import { SpareHead } from '@/shared/ui/spare/spare-head';
import { stockItems, whereWords } from '@/shared/ui/spare/spare-model';
import { SpareStanding } from '@/shared/ui/spare/spare-standing';
import { readBeforeWords, ruledOutWords } from '@/shared/ui/spare/spare-words';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** One spare: what it rests at, what it holds, everything that was read of it. */
export default function Spare() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const query = useSpare(id);
  const back = () => (router.canGoBack() ? router.back() : router.replace('/spares' as Href));
  if (query.data) return <Page spare={query.data} onBack={back} onStale={() => void query.refetch()} />;
  const gone = isProblem(query.error) && query.error.status === 404;
  return (
    <Screen header={<HeaderBar title="Spare" onBack={back} />}>
      {query.isError ? (
        <ErrorState
          failed={gone ? 'This spare is not here.' : 'The spare could not be read.'}
          toDo={gone ? 'Look for its label in the list.' : sentenceOf(query.error)}
          action={
            gone
              ? { title: 'All spares', onPress: () => router.replace('/spares' as Href) }
              : { title: 'Try again', onPress: () => void query.refetch(), busy: query.isFetching }
          }
        />
      ) : (
        <Loading what="the spare" onRetry={() => void query.refetch()} />
      )}
    </Screen>
  );
}

function Page({ spare, onBack, onStale }: { spare: SpareDto; onBack: () => void; onStale: () => void }) {
  const router = useRouter();
  const { marks } = useFormats();
  const now = useNow(60_000);
  const history = useSpareHistory(spare.id);
  const board = useBoard();
  const types = useModuleTypes();
  const meters = useMeters();
  const offline = useLink().state === 'down';
  const gate = useGate('spare:release');
  const asked = useLocalSearchParams<{ quarantine?: string }>().quarantine === '1';
  const [sheet, setSheet] = useState<'quarantine' | 'release' | null>(
    asked && spare.where !== 'quarantine' && blockedBecause(spare) === null ? 'quarantine' : null,
  );
  const item = stockItems([spare], board.data?.charges)[0] ?? { spare, card: null };
  const go = (path: string) => router.push(path as Href);
  const act = (kind: SpareAct) => {
    if (kind === 'reading') go(`/spares/${spare.id}/reading`);
    else if (kind === 'charge') go(`/charges/${spare.charge?.id ?? ''}`);
    else setSheet(kind);
  };
  const ratedAh = types.data?.find((type) => type.id === spare.moduleTypeId)?.ratedAh ?? null;
  const people = gate.people.length > 0 ? ` (${gate.people.join(', ')})` : '';
  const canPlan = spare.where === 'shelf' && ruledOutWords(spare, marks) === null && readBeforeWords(spare) === null;
  return (
    <Screen
      header={
        <HeaderBar
          title={spare.label}
          sub={`${spare.typeName} · ${whereWords(item)}`}
          onBack={onBack}
          tools={
            spare.where === 'fitted' ? undefined : (
              <Link title="Edit" align="right" onPress={() => go(`/spares/${spare.id}/edit`)} />
            )
          }
        />
      }
      foot={
        <SpareFoot
          spare={spare}
          offline={offline}
          releasers={gate.may ? null : `${gate.roles}${people}`}
          problem={null}
          onAct={act}
        />
      }
    >
      <Columns
        order={['facts', 'work', 'side']}
        work={
          <View style={{ rowGap: 18 }}>
            <SpareStanding spare={spare} now={now} />
            <SpareHead item={item} now={now} />
            {canPlan ? (
              <Button
                look="line"
                icon="plan"
                title={`Plan a charge with ${spare.label}`}
                onPress={() => go(`/plan?spare=${spare.id}`)}
              />
            ) : null}
            {spare.charge && spare.where === 'charge' ? (
              <Link title={`Open the charge ${spare.charge.title}`} onPress={() => act('charge')} />
            ) : null}
            <Rule gap={0} />
            <SpareCapacity spare={spare} ratedAh={ratedAh} />
            <CapacityFinding
              spare={spare}
              now={now}
              offline={offline}
              onOpenCharge={(id) => go(`/charges/${id}`)}
              onStale={onStale}
            />
            {spare.note ? <Txt tone="ink2">{spare.note}</Txt> : null}
          </View>
        }
        side={
          <View style={{ rowGap: 24 }}>
            {history.data ? (
              <>
                <ReadingsHistory
                  readings={history.data.readings}
                  now={now}
                  meterName={(id) => meters.data?.find((meter) => meter.id === id)?.name ?? null}
                />
                <CapacityHistory capacities={spare.capacities} now={now} onOpenCharge={(id) => go(`/charges/${id}`)} />
                <SpareCharges charges={history.data.charges} now={now} onOpen={(id) => go(`/charges/${id}`)} />
              </>
            ) : history.isError ? (
              <ErrorState
                failed="The readings could not be read."
                toDo={sentenceOf(history.error)}
                action={{ title: 'Try again', onPress: () => void history.refetch(), busy: history.isFetching }}
              />
            ) : (
              <Loading what="the readings" onRetry={() => void history.refetch()} />
            )}
          </View>
        }
      />
      {sheet === 'quarantine' ? <Quarantine spare={spare} onClose={() => setSheet(null)} onStale={onStale} /> : null}
      {sheet === 'release' ? <Release spare={spare} onClose={() => setSheet(null)} onStale={onStale} /> : null}
    </Screen>
  );
}

/** @param onStale somebody else was first: read the spare again */
function Quarantine({ spare, onClose, onStale }: { spare: SpareDto; onClose: () => void; onStale: () => void }) {
  const { zone, marks } = useFormats();
  const now = useNow(60_000);
  const quarantine = useQuarantineSpare();
  const draft = useDraft(`quarantine.${spare.id}`, noQuarantineDraft);
  const card = useBoard().data?.charges.find((other) => other.id === spare.charge?.id);
  const confirm = (input: QuarantineInput) => {
    const { charge } = spare;
    // The board hears of every change of a charge, the stock only of those that move the spare.
    const seen = charge && { id: charge.id, rev: Math.max(charge.rev, card?.rev ?? 0) };
    quarantine.mutate(
      { id: spare.id, rev: spare.rev, ...input, charge: seen },
      {
        onSuccess: () => {
          draft.clear();
          onClose();
        },
        onError: (error) => isConflict(error) && onStale(),
      },
    );
  };
  const at = card ? ` at ${moment(Date.parse(card.clipOnAt), zone, now, marks)}` : '';
  return (
    <QuarantineSheet
      spare={spare}
      fact={
        spare.charge
          ? `It is ${spare.charge.stage} for ${spare.charge.title}${at}. That plan falls away.`
          : 'No plan takes it until a foreman releases it.'
      }
      draft={draft.value}
      onDraft={draft.set}
      busy={quarantine.isPending}
      problem={quarantine.error ? sentenceOf(quarantine.error) : null}
      onConfirm={confirm}
      onClose={onClose}
    />
  );
}

function Release({ spare, onClose, onStale }: { spare: SpareDto; onClose: () => void; onStale: () => void }) {
  const { marks } = useFormats();
  const release = useReleaseSpare();
  const still = ruledOutWords({ ...spare, quarantine: null }, marks);
  return (
    <ConfirmSheet
      open
      title={`Release ${spare.label}`}
      fact={
        still
          ? `It leaves quarantine, but no plan takes it yet: ${still}. Change its condition or read it again.`
          : 'It goes back on the shelf and plans may take it again.'
      }
      confirm="Release from quarantine"
      safe="Keep it in quarantine"
      busy={release.isPending}
      onConfirm={() =>
        release.mutate(
          { id: spare.id, rev: spare.rev },
          { onSuccess: onClose, onError: (error) => isConflict(error) && onStale() },
        )
      }
      onClose={onClose}
    >
      {spare.quarantine ? <Txt>{`Put in by ${spare.quarantine.by.name}: ${spare.quarantine.reason}.`}</Txt> : null}
      {release.error ? (
        <Txt tone="alarm" bold role="alert">
          {sentenceOf(release.error)}
        </Txt>
      ) : null}
    </ConfirmSheet>
  );
}
