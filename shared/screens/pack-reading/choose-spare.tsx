import { useState } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useLink } from '@/shared/client/link';
import { useModuleTypes } from '@/shared/client/module-types';
import { useCandidates, useFreeSpare, useReserveSpare } from '@/shared/client/repairs';
import { isScanned } from '@/shared/client/scanned-spare';
import type { TargetDto } from '@/shared/contract/pack-reading';
import type { RepairPageDto } from '@/shared/contract/repair';
import { FitSheet } from '../repair/fit-sheet';
import { ScanButton, type ScannedSpare } from '../scan/scan-button';
import { useFormats } from '@/shared/ui/format/formats';
import { tolerance, volts as voltsText } from '@/shared/ui/format/quantities';
import { Button } from '@/shared/ui/primitives/button';
import { Txt } from '@/shared/ui/primitives/txt';
import { CandidateRow } from '@/shared/ui/repair-spare/candidate-row';
import { nextAsItIs } from '@/shared/ui/repair/repair-next';
import { planHref } from '@/shared/ui/repair-spare/candidate-words';
import { Foot } from '@/shared/ui/screen/foot';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';
import { StepScreen } from './step-screen';

/** Spares of the pack's type for the target of a repair, the soonest first; one of them is reserved. */
export function ChooseSpare({
  repair,
  target,
  onBack,
  onGo,
  onStock,
}: {
  repair: RepairPageDto;
  target: TargetDto;
  onBack: () => void;
  onGo: (href: string) => void;
  onStock: () => void;
}) {
  const { marks } = useFormats();
  const now = useNow(60_000);
  const list = useCandidates(repair.id);
  const types = useModuleTypes();
  const reserve = useReserveSpare();
  const free = useFreeSpare();
  const offline = useLink().state === 'down';
  const [problem, setProblem] = useState<string | null>(null);
  const type = types.data?.find(({ id }) => id === repair.pack.moduleTypeId);
  const window = type ? { lowVolts: type.dischargeLimitVolts, highVolts: type.chargeLimitVolts } : null;
  const { charge } = repair;
  const plan = charge === null ? planHref(repair) : null;
  const asItIs = charge === null ? nextAsItIs(repair) : null;
  const [fits, setFits] = useState(false);
  const told = { onError: (error: Error) => setProblem(sentenceOf(error)) };
  const scanned = (spare: ScannedSpare): string | null => {
    const candidate = list.data?.find(({ spareId, label }) => isScanned(spare, { id: spareId, label }));
    if (!candidate) return `${spare.label} is no spare of this pack’s type in stock. Scan another.`;
    if (candidate.ruledOut) return `${candidate.label}: ${candidate.problems.join(' ') || 'it cannot be planned.'}`;
    setProblem(null);
    reserve.mutate({ id: repair.id, spareId: candidate.spareId }, told);
    return null;
  };
  return (
    <StepScreen
      title="Choose a spare"
      repair={repair}
      onBack={onBack}
      foot={
        charge ? (
          <Foot>
            <Button title="Open the charge" onPress={() => onGo(`/charges/${charge.id}`)} />
          </Foot>
        ) : asItIs ? (
          <Foot note={offline ? 'No connection: it is fitted when it is back.' : undefined} noteId="fit-why">
            <Button
              title={asItIs.title}
              disabled={offline && asItIs.kind !== 'go'}
              describedBy="fit-why"
              onPress={() => (asItIs.kind === 'go' ? onGo(asItIs.path) : setFits(true))}
            />
          </Foot>
        ) : plan ? (
          <Foot>
            <Button title="Plan a charge" onPress={() => onGo(plan)} />
          </Foot>
        ) : undefined
      }
    >
      <Txt>{`Target ${voltsText(target.volts, marks)} ${tolerance(target.toleranceMillivolts / 1000)}`}</Txt>
      {charge ? <Txt bold>{`${charge.spare.label} is on its charge for this repair, ${charge.number}.`}</Txt> : null}
      {list.data && list.data.length > 0 ? (
        <ScanButton disabled={offline || reserve.isPending} onSpare={scanned} />
      ) : null}
      {repair.spare && plan ? (
        <View style={{ rowGap: 8 }}>
          <Txt bold>{`${repair.spare.label} is reserved for this repair.`}</Txt>
          <Button
            look="line"
            title={`Release ${repair.spare.label}`}
            busy={free.isPending}
            disabled={offline}
            onPress={() => {
              setProblem(null);
              free.mutate({ id: repair.id, rev: repair.rev }, told);
            }}
          />
        </View>
      ) : null}
      {problem ? (
        <Txt kind="label" tone="alarm" role="alert">
          {problem}
        </Txt>
      ) : null}
      {offline ? (
        <Txt kind="small" tone="ink2">
          No connection: spares are reserved when it is back.
        </Txt>
      ) : null}
      {list.data ? (
        list.data.length === 0 ? (
          <Empty
            sentence="No spare of this pack’s type is in stock."
            action={{ title: 'Open the spares', onPress: onStock }}
          />
        ) : (
          <View role="list" aria-label="Spares for the target">
            {list.data.map((candidate) => (
              <CandidateRow
                key={candidate.spareId}
                candidate={candidate}
                targetVolts={target.volts}
                window={window}
                chosen={candidate.spareId === repair.spare?.id}
                now={now}
                busy={reserve.isPending && reserve.variables?.spareId === candidate.spareId}
                disabled={offline}
                onReserve={() => {
                  setProblem(null);
                  reserve.mutate({ id: repair.id, spareId: candidate.spareId }, told);
                }}
              />
            ))}
          </View>
        )
      ) : list.isError ? (
        <ErrorState
          failed="The spares could not be reckoned."
          toDo={sentenceOf(list.error)}
          action={{ title: 'Try again', onPress: () => void list.refetch(), busy: list.isFetching }}
        />
      ) : (
        <Loading what="the spares" onRetry={() => void list.refetch()} />
      )}
      {fits ? <FitSheet repair={repair} onClose={() => setFits(false)} onFitted={onBack} /> : null}
    </StepScreen>
  );
}
