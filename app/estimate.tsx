import { useRouter, type Href } from 'expo-router';
import { lazy, Suspense, useEffect, useRef, useState } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useDraft } from '@/shared/client/drafts';
import { preloadEstimate, useEstimate } from '@/shared/client/estimates';
import { useSession } from '@/shared/client/session';
import { returnTo } from '@/shared/client/session-state';
import type { EstimateInput } from '@/shared/contract/estimate';
import { EstimateFields } from '@/shared/ui/estimate/estimate-fields';
import { EstimateResult, shownFinish, type QuickFinish } from '@/shared/ui/estimate/estimate-result';
import { EstimateRefused, EstimateTrust } from '@/shared/ui/estimate/estimate-trust';
import {
  emptyEstimate,
  isUntouched,
  neededFields,
  type EstimateField,
  type EstimateTyped,
} from '@/shared/ui/estimate/estimate-typed';
import type { EstimateRead } from '@/shared/ui/estimate/read-estimate';
import { RuledOutFinish } from '@/shared/ui/estimate/ruled-out-finish';
import { Button } from '@/shared/ui/primitives/button';
import { StandingLine } from '@/shared/ui/primitives/call-out';
import { Rule } from '@/shared/ui/primitives/rule';
import { Txt } from '@/shared/ui/primitives/txt';
import { Columns } from '@/shared/ui/screen/columns';
import { ButtonRow, Foot } from '@/shared/ui/screen/foot';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const Picture = lazy(async () => ({ default: (await import('@/shared/ui/plan/plan-picture')).PlanPicture }));

/** Six numbers in, a time and a band out. No sign-in; reckoned on this device. */
export default function Estimate() {
  const router = useRouter();
  const signedIn = Boolean(useSession().data);
  const draft = useDraft('estimate', emptyEstimate);
  const typed = draft.value;
  const { read, input } = useTypedEstimate(typed);
  const estimate = useEstimate(input);
  const [left, setLeft] = useState<Partial<Record<EstimateField, true>>>({});
  const [wished, setWished] = useState<QuickFinish | null>(null);
  const fields = useRef<{ focus: (field: EstimateField) => void }>(null);
  const errors = Object.fromEntries(
    Object.entries(read?.errors ?? {}).filter(([field]) => left[field as EstimateField]),
  ) as EstimateRead['errors'];

  const plan = () => {
    const path = `/plan${typed.targetVolts ? `?target=${encodeURIComponent(typed.targetVolts)}` : ''}`;
    if (signedIn) return router.push(path as Href);
    returnTo.keep(path);
    router.push('/sign-in' as Href);
  };
  const clear = () => {
    draft.clear();
    setLeft({});
    setWished(null);
    fields.current?.focus('spareVolts');
  };
  const missing = neededFields.filter((field) => typed[field].trim() === '').length;

  return (
    <Screen
      header={
        <HeaderBar
          title="Quick estimate"
          sub="No sign-in. Nothing leaves this device."
          onBack={() => (router.canGoBack() ? router.back() : router.replace('/' as Href))}
        />
      }
      foot={
        <Foot>
          <ButtonRow>
            <Button title="Clear" look="line" disabled={isUntouched(typed)} onPress={clear} />
            <Button title={signedIn ? 'Plan it' : 'Sign in and plan it'} grow onPress={plan} />
          </ButtonRow>
        </Foot>
      }
    >
      <Columns
        order={['facts', 'work']}
        facts={
          <EstimateFields
            ref={fields}
            typed={typed}
            errors={errors}
            onChange={(change) => draft.set((last) => ({ ...last, ...change }))}
            onLeave={(field) =>
              // An empty field that was only passed through is not wrong yet.
              setLeft((last) => (typed[field].trim() === '' ? last : { ...last, [field]: true }))
            }
          />
        }
        work={
          <View style={{ rowGap: 14 }}>
            <Rule gap={0} />
            {input === null ? (
              <Txt tone="ink2">
                {missing > 0 || read === null
                  ? 'Type the six numbers. Time and band stand here as you type.'
                  : 'A number above needs a change. Then time and band stand here.'}
              </Txt>
            ) : estimate.isError ? (
              <ErrorState
                failed="The time could not be reckoned."
                safe="What you typed is kept."
                toDo={sentenceOf(estimate.error)}
                action={{ title: 'Try again', onPress: () => void estimate.refetch(), busy: estimate.isFetching }}
              />
            ) : estimate.data ? (
              <Outcome
                estimate={estimate.data}
                input={input}
                old={estimate.isPlaceholderData}
                wished={wished}
                onFinish={setWished}
              />
            ) : (
              <Loading what="the planner" rows={2} onRetry={() => void estimate.refetch()} />
            )}
            <StandingLine />
          </View>
        }
      />
    </Screen>
  );
}

function Outcome({
  estimate,
  input,
  old,
  wished,
  onFinish,
}: {
  estimate: NonNullable<ReturnType<typeof useEstimate>['data']>;
  input: EstimateInput;
  old: boolean;
  wished: QuickFinish | null;
  onFinish: (finish: QuickFinish) => void;
}) {
  const finish = shownFinish(estimate, wished);
  const way = finish === null ? null : estimate[finish];
  if (finish === null || way === null) return <EstimateRefused estimate={estimate} />;
  return (
    <>
      <EstimateResult estimate={estimate} input={input} finish={finish} old={old} onFinish={onFinish} />
      <RuledOutFinish reasons={estimate.ruledOut} />
      <Rule gap={0} />
      <EstimateTrust estimate={estimate} way={way} input={input} />
      <Suspense fallback={null}>
        <Picture heading="The picture" option={way} clipOnAt={null} targetVolts={input.targetVolts} />
      </Suspense>
    </>
  );
}

/** The typed numbers as the contract reads them. The reader comes after the first paint, and the planner with it. */
function useTypedEstimate(typed: EstimateTyped): { read: EstimateRead | null; input: EstimateInput | null } {
  const [reader, setReader] = useState<((typed: EstimateTyped) => EstimateRead) | null>(null);
  useEffect(() => {
    let here = true;
    void import('@/shared/ui/estimate/read-estimate').then(({ readEstimate }) => here && setReader(() => readEstimate));
    preloadEstimate();
    return () => {
      here = false;
    };
  }, []);
  const read = reader === null ? null : reader(typed);
  return { read, input: read?.input ?? null };
}
