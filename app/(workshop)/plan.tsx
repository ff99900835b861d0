import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { lazy, Suspense, useEffect, useMemo, useState } from 'react';
import { View } from 'react-native';
import { isConflict, isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useQueueCharge } from '@/shared/client/charges';
import { useNow } from '@/shared/client/clock';
import { useDraft } from '@/shared/client/drafts';
import { wrongSentence } from '@/shared/client/forms';
import { useLink } from '@/shared/client/link';
import { useMeters } from '@/shared/client/meters';
import { useKeepPlan, usePlan } from '@/shared/client/plans';
import { useSpares } from '@/shared/client/spares';
import { useWorkshop } from '@/shared/client/workshop';
import type { PlanRequest } from '@/shared/contract/plan';
import { clock, moment, readyWithBand } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { ampHours, voltsNumber } from '@/shared/ui/format/quantities';
import { dayOf } from '@/shared/ui/format/zone';
import { LevelColumn } from '@/shared/ui/level-column/level-column';
import { emptyPlan, requestOf, type PlanField, type PlanTyped } from '@/shared/ui/plan/plan-typed';
import { PlanFields } from '@/shared/ui/plan/plan-fields';
import { PlanRefused } from '@/shared/ui/plan/plan-refused';
import { HowFarToTrustIt, WhatItTakes } from '@/shared/ui/plan/plan-trust';
import { PlanWays } from '@/shared/ui/plan/plan-ways';
import { optionTitle } from '@/shared/ui/plan/way-words';
import { Button } from '@/shared/ui/primitives/button';
import { CallOut, StandingLine } from '@/shared/ui/primitives/call-out';
import { FactList } from '@/shared/ui/primitives/fact-list';
import { Link } from '@/shared/ui/primitives/link';
import { Txt } from '@/shared/ui/primitives/txt';
import { Columns } from '@/shared/ui/screen/columns';
import { ButtonRow, Foot } from '@/shared/ui/screen/foot';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const PlanPicture = lazy(() => import('@/shared/ui/plan/plan-picture'));

/** Numbers are reckoned again this long after the last key. */
const settleMs = 400;

/** The value, once it has stood still. */
function useSettled<T>(value: T, ms: number): T {
  const key = JSON.stringify(value);
  const [settled, setSettled] = useState({ key, value });
  useEffect(() => {
    if (settled.key === key) return;
    const timer = setTimeout(() => setSettled({ key, value }), ms);
    return () => clearTimeout(timer);
  }, [key, value, ms, settled.key]);
  return settled.value;
}

const texts = (value: string | string[] | undefined): string =>
  Array.isArray(value) ? (value[0] ?? '') : (value ?? '');

/** Plan a charge: from spare to pack, every way side by side. */
export default function Plan() {
  const router = useRouter();
  const params = useLocalSearchParams();
  const topUpOf = texts(params.topUpOf) || null;
  const initial = useMemo<PlanTyped>(
    () => ({
      ...emptyPlan,
      spareId: texts(params.spare),
      targetVolts: texts(params.target),
      toleranceMillivolts: texts(params.tolerance),
      meterId: texts(params.meter),
      packCelsius: texts(params.celsius),
      repairRef: texts(params.repair),
      modulePosition: texts(params.position),
    }),
    // The address is read once; what is typed afterwards counts.
    // eslint-disable-next-line react-hooks/exhaustive-deps
    [],
  );
  const draft = useDraft(`plan.${topUpOf ?? initial.spareId}`, initial);
  const typed = draft.value;
  const { zone, marks } = useFormats();
  const now = useNow(30_000);
  const today = dayOf(now, zone);
  const offline = useLink().state === 'down';
  const spares = useSpares();
  const meters = useMeters();
  const workshop = useWorkshop();
  const [left, setLeft] = useState<Partial<Record<PlanField, true>>>({});
  const [tried, setTried] = useState(false);
  const { request, errors } = requestOf(typed, { zone, today, now });
  const settled = useSettled<PlanRequest | null>(request, settleMs);
  const plan = usePlan(settled);
  const keep = useKeepPlan();
  const queue = useQueueCharge();
  const [picked, setPicked] = useState<string | null>(null);
  const dto = settled && plan.data && !plan.isError ? plan.data : null;
  const options = dto?.plan.options ?? [];
  const fitting = options.filter((option) => option.withinTolerance && !option.tooLate);
  const chosen =
    options.find((option) => option.id === picked) ??
    fitting.find((option) => option.soonestBusbarsStay) ??
    fitting[0] ??
    options[0] ??
    null;
  const spare = spares.data?.find((other) => other.id === typed.spareId) ?? null;
  const shown = Object.fromEntries(
    Object.entries(errors).filter(([name]) => tried || left[name as PlanField]),
  ) as Partial<Record<PlanField, string>>;
  const serverFields = isProblem(plan.error) ? plan.error.fields : {};
  const back = () => (router.canGoBack() ? router.back() : router.replace('/bench' as Href));
  const change = (next: Partial<PlanTyped>) => {
    keep.reset();
    draft.set((last) => ({ ...last, ...next }));
  };
  const zero = dto ? Date.parse(dto.clipOnAt) : now;
  const band = chosen
    ? {
        p10: zero + chosen.totalS.p10 * 1000,
        p50: zero + chosen.totalS.p50 * 1000,
        p90: zero + chosen.totalS.p90 * 1000,
      }
    : null;
  const latest = dto && chosen?.latestStartS != null ? Date.parse(dto.plannedAt) + chosen.latestStartS * 1000 : null;

  const send = async (then: 'checks' | 'later') => {
    if (!request || !chosen) {
      setTried(true);
      return;
    }
    try {
      const charge = await keep.mutateAsync({ ...request, optionId: chosen.id, topUpOf });
      if (then === 'later') await queue.mutateAsync({ id: charge.id, rev: charge.rev, clipOnAt: request.clipOnAt });
      draft.clear();
      router.replace((then === 'checks' ? `/charges/${charge.id}/checks` : '/bench') as Href);
    } catch (error) {
      // The channel or the spare was taken meanwhile: the ways are reckoned anew, what is typed stays.
      if (isConflict(error)) void plan.refetch();
    }
  };
  const problem = keep.error ?? queue.error;
  const busy = keep.isPending || queue.isPending;
  const wrong = tried ? Object.keys(errors).length : 0;
  const note = problem
    ? sentenceOf(problem)
    : wrong > 0
      ? wrongSentence(wrong)
      : offline
        ? 'No connection: a plan is kept when it is back.'
        : null;

  return (
    <Screen
      header={
        <HeaderBar
          title={topUpOf ? 'Plan the top-up' : 'Plan a charge'}
          sub={
            [typed.repairRef, typed.modulePosition && `module ${typed.modulePosition}`, spare?.typeName]
              .filter(Boolean)
              .join(' · ') || undefined
          }
          onBack={back}
          clock={clock(now, zone, marks)}
        />
      }
      foot={
        <Foot
          noteId="plan-note"
          note={
            <View style={{ rowGap: 4 }}>
              {band ? (
                <View style={{ flexDirection: 'row', justifyContent: 'space-between', columnGap: 12 }}>
                  <Txt>{capital(readyWithBand(band, zone, now, marks))}</Txt>
                  {latest === null ? null : (
                    <Txt tone="ink2" nowrap>{`latest start ${moment(latest, zone, now, marks)}`}</Txt>
                  )}
                </View>
              ) : null}
              {note ? (
                <Txt kind="small" tone={problem || wrong > 0 ? 'alarm' : 'ink2'} role={problem ? 'alert' : undefined}>
                  {note}
                </Txt>
              ) : null}
            </View>
          }
        >
          <ButtonRow>
            <Button
              title="Checks before clipping on"
              grow
              disabled={offline || (request !== null && chosen === null)}
              busy={busy}
              describedBy="plan-note"
              onPress={() => void send('checks')}
            />
            <Button
              title="Queue"
              look="line"
              disabled={offline || chosen === null}
              busy={busy}
              onPress={() => void send('later')}
            />
          </ButtonRow>
        </Foot>
      }
    >
      <Columns
        order={['facts', 'work', 'side']}
        facts={
          <View style={{ rowGap: 16 }}>
            <Txt kind="heading" heading={2}>
              From spare to pack
            </Txt>
            {spare?.reading ? (
              <LevelColumn
                place="live"
                size={{ h: 132 }}
                stage="planned"
                groups={(dto?.plan.startVolts ?? spare.reading.groupVolts).map((volts) => ({
                  volts,
                  text: voltsNumber(volts, marks),
                }))}
                targetVolts={request?.targetVolts ?? spare.shelfVolts ?? spare.chargeLimitVolts}
                scale={{ kind: 'window', lowVolts: spare.dischargeLimitVolts, highVolts: spare.chargeLimitVolts }}
                name={spare.label}
                labels
                ends
                tab
              />
            ) : null}
            <PlanFields
              typed={typed}
              errors={{ ...shown, ...(serverFields as Partial<Record<PlanField, string>>) }}
              spares={spares.data?.filter((other) => other.where !== 'fitted')}
              meters={meters.data}
              today={today}
              toleranceHint={workshop.data ? String(workshop.data.toleranceMillivolts) : ''}
              onChange={change}
              onLeave={(field) => setLeft((last) => ({ ...last, [field]: true }))}
            />
            {spare && dto ? (
              <FactList
                tight
                facts={[
                  {
                    name: 'Each group takes',
                    value: ampHours(Math.max(...dto.plan.groupAmpHours.map(Math.abs)), marks),
                  },
                  {
                    name: 'Capacity',
                    value: ampHours(spare.usedCapacityAh, marks),
                    note: sourceWords[spare.capacitySource],
                  },
                ]}
              />
            ) : null}
          </View>
        }
        work={
          dto ? (
            dto.plan.refusals.length > 0 && spare ? (
              <PlanRefused spare={spare} refusals={dto.plan.refusals} targetVolts={settled?.targetVolts ?? 0} />
            ) : dto.plan.alreadyWithin ? (
              <CallOut tone="amber">
                <Txt bold>Every group is within the tolerance already. Nothing is to be charged.</Txt>
                <Txt>Read it once more with the pack’s meter before it is fitted.</Txt>
              </CallOut>
            ) : (
              <View style={{ rowGap: 20, opacity: plan.isPlaceholderData ? 0.6 : 1 }}>
                <PlanWays
                  dto={dto}
                  chosen={chosen?.id ?? null}
                  readyBy={settled?.readyBy ?? null}
                  now={now}
                  onChoose={setPicked}
                />
                {chosen ? <WhatItTakes option={chosen} channelNames={(id) => dto.channels[id]?.name ?? ''} /> : null}
                {chosen ? <HowFarToTrustIt option={chosen} plan={dto.plan} /> : null}
              </View>
            )
          ) : plan.isError && settled ? (
            <ErrorState
              failed="The ways could not be reckoned."
              safe="Nothing was kept; what you typed is."
              toDo={sentenceOf(plan.error)}
              action={{ title: 'Try again', onPress: () => void plan.refetch(), busy: plan.isFetching }}
            />
          ) : settled ? (
            <Loading what="the ways" onRetry={() => void plan.refetch()} />
          ) : (
            <Txt tone="ink2">
              Choose a spare and type the pack’s rest voltage: every way stands here with its time and band.
            </Txt>
          )
        }
        side={
          <View style={{ rowGap: 20 }}>
            {chosen && dto && dto.plan.refusals.length === 0 ? (
              <Suspense fallback={null}>
                <PlanPicture
                  heading={optionTitle(chosen)}
                  option={chosen}
                  clipOnAt={zero}
                  targetVolts={settled?.targetVolts ?? 0}
                />
              </Suspense>
            ) : null}
            <StandingLine />
            {draft.restored ? (
              <Link
                kind="small"
                title="Clear what was typed before"
                onPress={() => {
                  draft.clear();
                  setPicked(null);
                }}
              />
            ) : null}
          </View>
        }
      />
    </Screen>
  );
}

const sourceWords = { measured: 'measured', label: 'off the label', guessed: 'guessed' } as const;
const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
