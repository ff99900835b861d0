/* eslint-disable max-lines -- to be split: hooks and parts need a place that may import both shared/client and shared/ui */
import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { lazy, Suspense, useMemo, useState } from 'react';
import { View } from 'react-native';
import { isConflict, isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useQueueCharge } from '@/shared/client/charges';
import { useNow } from '@/shared/client/clock';
import { useDraft } from '@/shared/client/drafts';
import { wrongSentence } from '@/shared/client/forms';
import { useLink } from '@/shared/client/link';
import { useMeters } from '@/shared/client/meters';
import { useKeepPlan, usePlan, usePlans } from '@/shared/client/plans';
import { useSettled } from '@/shared/client/settled';
import { useSpares } from '@/shared/client/spares';
import { useWorkshop } from '@/shared/client/workshop';
import type { PlanRequest } from '@/shared/contract/plan';
import type { SpareDto } from '@/shared/contract/spare';
import { clock, moment } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { dayOf } from '@/shared/ui/format/zone';
import { bestOption } from '@/shared/ui/plan/best-option';
import { OtherSpares } from '@/shared/ui/plan/other-spares';
import { PlanFields } from '@/shared/ui/plan/plan-fields';
import { PlanActs } from '@/shared/ui/plan/plan-foot';
import { OutcomeLarge, OutcomeLine } from '@/shared/ui/plan/plan-outcome';
import { isOfTheModule, PlanRefused } from '@/shared/ui/plan/plan-refused';
import { PlanSummary } from '@/shared/ui/plan/plan-summary';
import { emptyPlan, fieldOf, requestOf, type PlanField, type PlanTyped } from '@/shared/ui/plan/plan-typed';
import { NoWay, PlanWork } from '@/shared/ui/plan/plan-work';
import { optionTitle } from '@/shared/ui/plan/way-words';
import { Button } from '@/shared/ui/primitives/button';
import { StandingLine } from '@/shared/ui/primitives/call-out';
import { Link } from '@/shared/ui/primitives/link';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { Columns } from '@/shared/ui/screen/columns';
import { ButtonRow, Foot } from '@/shared/ui/screen/foot';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ruledOutWords } from '@/shared/ui/spare/spare-words';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const PlanPicture = lazy(async () => ({ default: (await import('@/shared/ui/plan/plan-picture')).PlanPicture }));

/** Numbers are reckoned again this long after the last key. */
const settleMs = 400;
/** Other spares that are reckoned where this one is refused. */
const mostOthers = 3;

/** Plan a charge: from spare to pack, every way side by side. */
export default function Plan() {
  const router = useRouter();
  const toast = useToast();
  const { topUpOf, initial } = useAddress();
  const draft = useDraft(`plan.${topUpOf ?? initial.spareId}`, initial);
  const typed = draft.value;
  const { zone, marks } = useFormats();
  const now = useNow(30_000);
  const wide = useBreakpoint() === 'wide';
  const today = dayOf(now, zone);
  const offline = useLink().state === 'down';
  const spares = useSpares();
  const meters = useMeters();
  const workshop = useWorkshop();
  const [left, setLeft] = useState<Partial<Record<PlanField, true>>>({});
  const [tried, setTried] = useState(false);
  const [picked, setPicked] = useState<string | null>(null);
  const { request, errors } = requestOf(typed, { zone, today, now });
  // What came whole with the address or the draft is told in a few lines; anything else is still to be typed.
  const [open, setOpen] = useState(request === null);
  const settled = useSettled<PlanRequest | null>(request, settleMs);
  const plan = usePlan(settled);
  const keep = useKeepPlan();
  const queue = useQueueCharge();

  const dto = settled && plan.data && !plan.isError ? plan.data : null;
  const refused = dto !== null && dto.plan.refusals.length > 0;
  const chosen =
    dto === null || refused ? null : (dto.plan.options.find((option) => option.id === picked) ?? bestOption(dto.plan));
  const spare = spares.data?.find((other) => other.id === typed.spareId) ?? null;
  const others = useOthers(spare, refused && dto.plan.refusals.some(isOfTheModule) ? settled : null, spares.data);
  const back = () => (router.canGoBack() ? router.back() : router.replace('/bench' as Href));
  const change = (next: Partial<PlanTyped>) => {
    keep.reset();
    draft.set((last) => ({ ...last, ...next }));
  };
  const take = (spareId: string) => {
    setPicked(null);
    change({ spareId });
  };

  const send = async (then: 'checks' | 'later') => {
    setTried(true);
    if (!request || !chosen) return setOpen(true);
    const charge = await keep.mutateAsync({ ...request, optionId: chosen.id, topUpOf }).catch((error: unknown) => {
      // The channel or the spare was taken meanwhile: the ways are reckoned anew, what is typed stays.
      if (isConflict(error) || (isProblem(error) && error.status === 422)) void plan.refetch();
      return null;
    });
    if (charge === null) return;
    draft.clear();
    if (then === 'checks') return router.replace(`/charges/${charge.id}/checks` as Href);
    if (request.clipOnAt !== null)
      await queue
        .mutateAsync({ id: charge.id, rev: charge.rev, clipOnAt: request.clipOnAt })
        .catch((error: unknown) => toast({ text: `${charge.number} is kept, but not queued: ${sentenceOf(error)}` }));
    router.replace(`/charges/${charge.id}` as Href);
  };

  const shown = Object.fromEntries(
    Object.entries(errors).filter(([name]) => tried || left[name as PlanField]),
  ) as Partial<Record<PlanField, string>>;
  const serverFields = isProblem(plan.error)
    ? Object.fromEntries(Object.entries(plan.error.fields).map(([path, text]) => [fieldOf(path), text]))
    : {};
  const wrong = tried ? Object.keys(errors).length : 0;
  const acts = (
    <PlanActs
      holder={holderOf(keep.error, (id) => router.push(`/charges/${id}` as Href))}
      problem={keep.error ? sentenceOf(keep.error) : wrong > 0 ? wrongSentence(wrong) : null}
      note={
        offline
          ? 'No connection: a plan is kept when it is back.'
          : request !== null && chosen === null && !plan.isFetching
            ? 'There is no way to keep yet.'
            : null
      }
      disabled={offline || (request !== null && chosen === null)}
      busy={keep.isPending || queue.isPending}
      later={
        request?.clipOnAt ? `Queue it for ${moment(Date.parse(request.clipOnAt), zone, now, marks)}` : 'Keep for later'
      }
      onChecks={() => void send('checks')}
      onLater={() => void send('later')}
    />
  );
  const foot = refused ? (
    <RefusedFoot
      spare={spare}
      next={others[0]?.spare ?? null}
      onQuarantine={() => router.push(`/spares/${typed.spareId}?quarantine=1` as Href)}
      onTake={take}
    />
  ) : wide ? undefined : (
    <Foot note={dto && chosen ? <OutcomeLine dto={dto} option={chosen} now={now} /> : undefined}>{acts}</Foot>
  );

  return (
    <Screen
      header={
        <HeaderBar
          title={topUpOf ? 'Plan the top-up' : 'Plan a charge'}
          sub={
            [
              typed.repairRef,
              typed.modulePosition && `module ${typed.modulePosition}`,
              spare?.typeName,
              wide && spare ? `spare ${spare.label}${spare.shelfPlace ? `, shelf ${spare.shelfPlace}` : ''}` : '',
            ]
              .filter(Boolean)
              .join(' · ') || undefined
          }
          onBack={back}
          clock={clock(now, zone, marks)}
        />
      }
      foot={foot}
    >
      <Columns
        order={['facts', 'work', 'side']}
        facts={
          <View style={{ rowGap: 14 }}>
            {wide ? (
              <Txt kind="heading" heading={2}>
                From spare to pack
              </Txt>
            ) : null}
            {spare && !(refused && !wide) ? <PlanSummary spare={spare} request={settled} dto={dto} now={now} /> : null}
            {open ? (
              <PlanFields
                typed={typed}
                errors={{ ...shown, ...serverFields }}
                spares={spares.data?.filter((other) => other.where !== 'fitted')}
                meters={meters.data}
                today={today}
                toleranceHint={workshop.data ? String(workshop.data.toleranceMillivolts) : ''}
                onChange={change}
                onLeave={(field) => setLeft((last) => ({ ...last, [field]: true }))}
              />
            ) : null}
            <View style={{ flexDirection: 'row', justifyContent: 'space-between', marginVertical: -8 }}>
              {request !== null ? (
                <Link
                  kind="small"
                  title={open ? 'fold away' : 'change spare, target or times'}
                  onPress={() => setOpen(!open)}
                />
              ) : (
                <View />
              )}
              {draft.restored ? (
                <Link
                  kind="small"
                  align="right"
                  title="clear what was typed before"
                  onPress={() => {
                    draft.clear();
                    setPicked(null);
                    setOpen(true);
                  }}
                />
              ) : null}
            </View>
          </View>
        }
        work={
          dto && refused && spare ? (
            <View style={{ rowGap: 20 }}>
              <PlanRefused
                spare={spare}
                refusals={dto.plan.refusals}
                targetVolts={settled?.targetVolts ?? 0}
                now={now}
              />
              {dto.plan.refusals.some(isOfTheModule) ? (
                <OtherSpares others={others} clipOnAt={Date.parse(dto.clipOnAt)} onTake={take} />
              ) : null}
            </View>
          ) : dto && dto.plan.options.length === 0 ? (
            <NoWay dto={dto} />
          ) : dto ? (
            <PlanWork
              dto={dto}
              chosen={chosen}
              readyBy={settled?.readyBy ?? null}
              now={now}
              old={plan.isPlaceholderData}
              onChoose={setPicked}
            />
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
              Choose a spare and type the pack’s rest voltage. Every way then stands here with its time and band.
            </Txt>
          )
        }
        side={
          <View style={{ rowGap: 18 }}>
            {chosen && dto ? (
              <Suspense fallback={null}>
                <PlanPicture
                  heading={wide ? 'The picture' : `${optionTitle(chosen)}, ${chosen.channelText.replace(/^.* · /, '')}`}
                  option={chosen}
                  clipOnAt={Date.parse(dto.clipOnAt)}
                  targetVolts={settled?.targetVolts ?? 0}
                />
              </Suspense>
            ) : null}
            {wide && chosen && dto ? <OutcomeLarge dto={dto} option={chosen} now={now} /> : null}
            <StandingLine />
            {wide && !refused ? acts : null}
          </View>
        }
      />
    </Screen>
  );
}

/** What the address brings along: a spare from the stock, or everything of a top-up. Read once; what is typed then counts. */
function useAddress(): { topUpOf: string | null; initial: PlanTyped } {
  const params = useLocalSearchParams();
  const [address] = useState(params);
  return useMemo(() => {
    const text = (name: string): string => {
      const value = address[name];
      return (Array.isArray(value) ? value[0] : value) ?? '';
    };
    return {
      topUpOf: text('topUpOf') || null,
      initial: {
        ...emptyPlan,
        spareId: text('spare'),
        targetVolts: text('target'),
        toleranceMillivolts: text('tolerance'),
        meterId: text('meter'),
        packCelsius: text('celsius'),
        repairRef: text('repair'),
        modulePosition: text('position'),
      },
    };
  }, [address]);
}

/** Spares of the same type on the shelf, reckoned to the same target, the soonest first. */
function useOthers(spare: SpareDto | null, request: PlanRequest | null, all: readonly SpareDto[] | undefined) {
  const { marks } = useFormats();
  const candidates =
    spare && request
      ? (all ?? [])
          .filter(
            (other) =>
              other.id !== spare.id &&
              other.moduleTypeId === spare.moduleTypeId &&
              other.where === 'shelf' &&
              ruledOutWords(other, marks) === null,
          )
          .slice(0, mostOthers)
      : [];
  const plans = usePlans(request ? candidates.map((other) => ({ ...request, spareId: other.id })) : []);
  const likely = (index: number) => {
    const dto = plans[index]?.data;
    return (dto && bestOption(dto.plan)?.totalS.p50) ?? Number.POSITIVE_INFINITY;
  };
  return candidates
    .map((other, index) => ({ spare: other, dto: plans[index]?.data ?? null, likely: likely(index) }))
    .sort((a, b) => a.likely - b.likely);
}

/** The charge that holds the spare already, as the refusal names it. */
function holderOf(error: unknown, open: (chargeId: string) => void) {
  if (!isConflict(error)) return null;
  const present = error.present as { chargeId?: string; title?: string } | undefined;
  const { chargeId, title } = present ?? {};
  return chargeId && title ? { title, onOpen: () => open(chargeId) } : null;
}

function RefusedFoot({
  spare,
  next,
  onQuarantine,
  onTake,
}: {
  spare: SpareDto | null;
  next: SpareDto | null;
  onQuarantine: () => void;
  onTake: (spareId: string) => void;
}) {
  const aside = spare?.where === 'quarantine';
  if (aside && !next) return undefined;
  return (
    <Foot>
      <ButtonRow>
        {aside ? null : <Button title="Quarantine" look="line" grow={!next} onPress={onQuarantine} />}
        {next ? <Button title={`Plan with ${next.label}`} grow onPress={() => onTake(next.id)} /> : null}
      </ButtonRow>
    </Foot>
  );
}
