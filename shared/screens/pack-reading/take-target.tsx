import { useState } from 'react';
import { View } from 'react-native';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useDraft } from '@/shared/client/drafts';
import { useLink } from '@/shared/client/link';
import { useMeters } from '@/shared/client/meters';
import { useTakeTarget } from '@/shared/client/repairs';
import { takeTargetSchema, type ComputedTargetDto, type PackReadingDto } from '@/shared/contract/pack-reading';
import type { RepairPageDto } from '@/shared/contract/repair';
import { useFormats } from '@/shared/ui/format/formats';
import { volts as voltsText } from '@/shared/ui/format/quantities';
import { errorText, slopeText, trustReasons, trustWords } from '@/shared/ui/pack-reading/target-words';
import { typedProblem } from '@/shared/ui/pack-reading/typed-pad';
import { Button } from '@/shared/ui/primitives/button';
import { CallOut, Caution } from '@/shared/ui/primitives/call-out';
import { ChoiceList } from '@/shared/ui/primitives/choice-row';
import { FactList } from '@/shared/ui/primitives/fact-list';
import { Field } from '@/shared/ui/primitives/field';
import { Txt } from '@/shared/ui/primitives/txt';
import { FormFoot } from '@/shared/ui/spare/form-foot';
import { StepScreen } from './step-screen';

interface TargetTyped {
  way: 'computed' | 'typed';
  volts: string;
  tolerance: string;
  reason: string;
}
const initial: TargetTyped = { way: 'computed', volts: '', tolerance: '5', reason: '' };

/** The target as the healthy groups have it, with what it is worth; taken as it is, or another with a reason. */
export function TakeTarget({
  repair,
  computed,
  onBack,
  onRead,
  onTaken,
}: {
  repair: RepairPageDto;
  computed: ComputedTargetDto;
  onBack: () => void;
  onRead: () => void;
  onTaken: () => void;
}) {
  const { marks } = useFormats();
  const draft = useDraft<TargetTyped>(`repair.target.${computed.readingId}`, initial);
  const typed = draft.value;
  const take = useTakeTarget();
  const meters = useMeters();
  const offline = useLink().state === 'down';
  const [problem, setProblem] = useState<string | null>(null);
  const [errors, setErrors] = useState<Record<string, string>>({});
  const change = (part: Partial<TargetTyped>) => {
    setProblem(null);
    setErrors({});
    draft.set((last) => ({ ...last, ...part }));
  };
  const own = typed.way === 'typed';
  const reading = repair.readings.find(({ id }) => id === computed.readingId);
  const send = () => {
    if (own && typed.volts.trim() === '') return setErrors({ volts: 'Type the target.' });
    if (own && typed.reason.trim() === '')
      return setErrors({ reason: 'Say why another target than the computed one is taken.' });
    const read = takeTargetSchema.safeParse({
      readingId: computed.readingId,
      volts: own ? typed.volts : null,
      toleranceMillivolts: typed.tolerance,
      reason: own ? typed.reason : null,
    });
    if (!read.success)
      return setErrors(
        Object.fromEntries(read.error.issues.map(({ path, message }) => [String(path[0] ?? ''), message])),
      );
    take.mutate(
      { id: repair.id, ...read.data },
      {
        onSuccess: () => {
          draft.clear();
          onTaken();
        },
        onError: (error) => {
          if (isProblem(error)) setErrors(error.fields);
          setProblem(sentenceOf(error));
        },
      },
    );
  };
  return (
    <StepScreen
      title="Target"
      repair={repair}
      onBack={onBack}
      foot={
        <FormFoot
          title={own ? 'Take the typed target' : 'Take the computed target'}
          busy={take.isPending}
          offline={offline}
          problem={problem}
          onSend={send}
        />
      }
    >
      <View>
        <Txt kind="small" tone="ink2">
          Target from the healthy groups
        </Txt>
        <Txt kind="hero">{voltsText(computed.volts, marks)}</Txt>
      </View>
      <FactList
        facts={[
          { name: 'Standard error', value: errorText(computed.standardErrorMillivolts, marks) },
          { name: 'Healthy groups', value: String(computed.healthy) },
          { name: 'Slope', value: slopeText(computed.slopeMillivoltsPerPercent, marks) },
          { name: 'Trust', value: trustWords[computed.trust] },
        ]}
      />
      {computed.reasons.length > 0 ? (
        <CallOut tone="amber" label="What takes trust from it">
          <View style={{ rowGap: 4 }}>
            {computed.reasons.map((reason) => (
              <Txt key={reason}>{trustReasons[reason]}</Txt>
            ))}
          </View>
        </CallOut>
      ) : null}
      {computed.reasons.includes('old-reading') ? (
        <Button look="line" title="Read the pack again" onPress={onRead} />
      ) : null}
      <Caution>{crossCheck(repair, reading, (id) => meters.data?.find((one) => one.id === id)?.name ?? null)}</Caution>
      <ChoiceList
        label="Target"
        value={typed.way}
        choices={[
          { value: 'computed', title: `Take ${voltsText(computed.volts, marks)}`, meaning: 'As computed' },
          { value: 'typed', title: 'Type another', meaning: 'With the reason, kept with your name' },
        ]}
        onChange={(way) => change({ way })}
      />
      {own ? (
        <>
          <Field
            label="Other target"
            kind="decimal"
            unit="V"
            value={typed.volts}
            error={errors.volts ?? typedProblem(typed.volts) ?? undefined}
            onChangeText={(text) => change({ volts: text })}
          />
          <Field
            label="Why another"
            maxLength={300}
            value={typed.reason}
            error={errors.reason}
            onChangeText={(reason) => change({ reason })}
          />
        </>
      ) : null}
      <Field
        label="Tolerance, ±"
        kind="decimal"
        unit="mV"
        value={typed.tolerance}
        error={errors.toleranceMillivolts}
        onChangeText={(tolerance) => change({ tolerance })}
      />
    </StepScreen>
  );
}

/** Whether the pack's instrument and the meter that will read the spare were held against each other on one cell. */
function crossCheck(
  repair: RepairPageDto,
  reading: PackReadingDto | undefined,
  nameOf: (meterId: string) => string | null,
): string {
  if (reading?.meterId)
    return `The pack was read with ${nameOf(reading.meterId) ?? 'a meter of the workshop'}. Read the spare with the same meter.`;
  const source = repair.sources.find((one) => one.readingId === reading?.id && one.offsetMillivolts !== null);
  if (!source)
    return 'The pack’s instrument and the spare’s meter were not held against each other on one cell. Their offset is not known and goes into the target: measure one healthy group with the meter at the second source.';
  const meter = source.meterId ? nameOf(source.meterId) : null;
  const off = source.offsetMillivolts!;
  return `On a healthy group ${meter ?? 'the meter'} read ${Math.abs(off)}\u00a0mV ${off < 0 ? 'below' : 'above'} the pack’s instrument.`;
}
