import { useState } from 'react';
import { sentenceOf } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useDraft } from '@/shared/client/drafts';
import { useGate } from '@/shared/client/gate';
import { useLink } from '@/shared/client/link';
import { useMeters } from '@/shared/client/meters';
import { useDecideSource } from '@/shared/client/repairs';
import type { PackReadingDto, SecondSourceDto } from '@/shared/contract/pack-reading';
import type { RepairPageDto } from '@/shared/contract/repair';
import { TwoSources } from '@/shared/ui/pack-reading/two-sources';
import { Button } from '@/shared/ui/primitives/button';
import { CallOut } from '@/shared/ui/primitives/call-out';
import { ChoiceList } from '@/shared/ui/primitives/choice-row';
import { Field } from '@/shared/ui/primitives/field';
import { Span, Txt } from '@/shared/ui/primitives/txt';
import { FormFoot } from '@/shared/ui/spare/form-foot';
import { StepScreen } from './step-screen';

/** A module position after 'm:', or that neither is right yet. */
interface Decision {
  choice: string | null;
  why: string;
}
const undecided: Decision = { choice: null, why: '' };

/** The two sources disagree: what each says, and who may decides with a reason. Nothing is preselected. */
export function DecideSource({
  repair,
  reading,
  source,
  onBack,
  onMeasure,
  onDecided,
}: {
  repair: RepairPageDto;
  reading: PackReadingDto;
  source: SecondSourceDto;
  onBack: () => void;
  /** Measures again instead. */
  onMeasure: () => void;
  onDecided: (again: boolean) => void;
}) {
  const now = useNow(60_000);
  const gate = useGate('repair:decide');
  const meters = useMeters();
  const offline = useLink().state === 'down';
  const draft = useDraft<Decision>(`repair.decide.${source.id}`, undecided);
  const decide = useDecideSource();
  const [problem, setProblem] = useState<string | null>(null);
  const { choice, why } = draft.value;
  const pack = reading.oddPositions[0] ?? null;
  const meter = source.pointsTo;
  const fact =
    meter !== null
      ? `The pack says module ${pack ?? source.modulePosition}, your meter says ${meter}.`
      : `The meter does not agree with the pack at module ${source.modulePosition}.`;
  const modules = [...new Set([meter, pack, source.modulePosition].filter((one) => one !== null))];
  const choices = [
    ...modules.map((position) => ({
      value: `m:${position}`,
      title: `Module ${position}, ${position === meter ? 'as metered' : position === pack ? 'as the pack says' : 'where the meter was'}`,
      meaning:
        position === meter
          ? 'The pack counts from the other end, or a lead is one off'
          : position === pack
            ? 'The meter was at the wrong module'
            : 'Neither of the two points to it',
    })),
    { value: 'again', title: 'Neither yet: read the pack again', meaning: 'It stays at step 2' },
  ];
  const position = choice?.startsWith('m:') ? choice.slice(2) : null;
  const send = () => {
    if (choice === null) return setProblem('Choose what it is.');
    if (why.trim() === '') return setProblem('Say why: it is kept with your name.');
    setProblem(null);
    decide.mutate(
      {
        ...{ id: repair.id, sourceId: source.id },
        ...{ decision: position === null ? 'read-again' : 'module', modulePosition: position, reason: why },
      },
      {
        onSuccess: () => {
          draft.clear();
          onDecided(position === null);
        },
        onError: (error) => setProblem(sentenceOf(error)),
      },
    );
  };
  const people = gate.people.length > 0 ? gate.people.join(' or ') : gate.roles;
  return (
    <StepScreen
      title="Second source"
      repair={repair}
      onBack={onBack}
      foot={
        gate.may ? (
          <FormFoot
            title={choice === null ? 'Decide' : position === null ? 'Decide: read again' : `Decide: module ${position}`}
            busy={decide.isPending}
            offline={offline}
            problem={problem}
            onSend={send}
          />
        ) : undefined
      }
    >
      <CallOut tone="amber" label="The sources disagree">
        <Txt>
          <Span bold>{fact}</Span> Someone must decide before it goes on.
        </Txt>
      </CallOut>
      <TwoSources
        pack={repair.pack}
        reading={reading}
        source={source}
        meterName={meters.data?.find(({ id }) => id === source.meterId)?.name ?? null}
        now={now}
      />
      {gate.may ? (
        <>
          <ChoiceList
            label="Decide"
            value={choice}
            choices={choices}
            onChange={(next) => draft.set((last) => ({ ...last, choice: next }))}
          />
          <Field
            label="Why"
            hint="kept with your name"
            value={why}
            maxLength={300}
            onChangeText={(text) => draft.set((last) => ({ ...last, why: text }))}
          />
        </>
      ) : (
        <Txt bold>{`${gate.roles.charAt(0).toUpperCase()}${gate.roles.slice(1)} decides. Ask ${people}.`}</Txt>
      )}
      <Button look="line" title="Measure again" onPress={onMeasure} />
    </StepScreen>
  );
}
