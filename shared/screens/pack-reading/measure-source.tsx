import { useMemo, useState } from 'react';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useDraft } from '@/shared/client/drafts';
import { useLink } from '@/shared/client/link';
import { useHandMeters } from '@/shared/client/hand-meters';
import { useAddSecondSource } from '@/shared/client/repairs';
import { groupsAt, positionsOf } from '@/shared/contract/pack';
import { secondSourceSchema, type PackReadingDto } from '@/shared/contract/pack-reading';
import type { RepairPageDto } from '@/shared/contract/repair';
import { FieldPair } from '@/shared/ui/auth/form-stack';
import { useFormats } from '@/shared/ui/format/formats';
import { volts as voltsText } from '@/shared/ui/format/quantities';
import { sourceVerdict, type SourceTyped } from '@/shared/ui/pack-reading/source-words';
import { typedProblem, typedVolts } from '@/shared/ui/pack-reading/typed-pad';
import { Field } from '@/shared/ui/primitives/field';
import { Select } from '@/shared/ui/primitives/select';
import { Txt } from '@/shared/ui/primitives/txt';
import { FormFoot } from '@/shared/ui/spare/form-foot';
import { StepScreen } from './step-screen';

const notKnown = 'not-known';

/** What the hand meter shows at the suspected module, with the verdict while it is typed. */
export function MeasureSource({
  repair,
  reading,
  onBack,
  onSaved,
}: {
  repair: RepairPageDto;
  reading: PackReadingDto;
  onBack: () => void;
  onSaved: () => void;
}) {
  const { marks } = useFormats();
  const { pack } = repair;
  const positions = useMemo(() => [...new Set(positionsOf(pack))], [pack]);
  const first = reading.oddPositions[0] ?? positions[0]!;
  const initial = useMemo<SourceTyped>(
    () => ({
      ...{ modulePosition: first, groupVolts: groupsAt(pack, first).map(() => '') },
      ...{ healthyGroup: '', healthyVolts: '', meterId: '', pointsTo: '' },
    }),
    [pack, first],
  );
  const draft = useDraft<SourceTyped>(`repair.source.${reading.id}`, initial);
  const typed = draft.value;
  const meters = useHandMeters();
  const add = useAddSecondSource();
  const offline = useLink().state === 'down';
  const [problem, setProblem] = useState<string | null>(null);
  const [errors, setErrors] = useState<Record<string, string>>({});
  const change = (part: Partial<SourceTyped>) => {
    setProblem(null);
    setErrors({});
    draft.set((last) => ({ ...last, ...part }));
  };
  const groups = groupsAt(pack, typed.modulePosition);
  const healthyAt = Number(typed.healthyGroup) - 1;
  const healthyVolts = typedVolts(typed.healthyVolts);
  const healthy =
    Number.isInteger(healthyAt) && healthyAt >= 0 && healthyAt < pack.groupCount && healthyVolts !== null
      ? { group: healthyAt, volts: healthyVolts }
      : null;
  const verdict = sourceVerdict(pack, reading, {
    modulePosition: typed.modulePosition,
    volts: typed.groupVolts.map(typedVolts),
    healthy,
    pointsTo: typed.pointsTo || null,
  });
  const send = () => {
    const open = groups.filter((_, at) => (typed.groupVolts[at] ?? '').trim() === '');
    if (open.length > 0)
      return setProblem(`Type what the meter shows at ${open.map((g) => `G${g + 1}`).join(' and ')}.`);
    if ((typed.healthyGroup.trim() === '') !== (typed.healthyVolts.trim() === '') || (typed.healthyGroup && !healthy))
      return setProblem(
        `A healthy group needs its number, 1 to ${pack.groupCount}, and its volts. Or leave both empty.`,
      );
    if (typed.meterId === '') return setProblem('Choose the meter, or not known.');
    const read = secondSourceSchema.safeParse({
      ...{ readingId: reading.id, modulePosition: typed.modulePosition, groupVolts: typed.groupVolts },
      ...{ healthyGroup: healthy, meterId: typed.meterId === notKnown ? null : typed.meterId },
      pointsTo: typed.pointsTo || null,
    });
    if (!read.success) {
      setErrors(Object.fromEntries(read.error.issues.map(({ path, message }) => [path.join('.'), message])));
      return setProblem(read.error.issues[0]?.message ?? null);
    }
    add.mutate(
      { id: repair.id, ...read.data },
      {
        onSuccess: () => {
          draft.clear();
          onSaved();
        },
        onError: (error) => {
          if (isProblem(error)) setErrors(error.fields);
          setProblem((isProblem(error) && Object.values(error.fields)[0]) || sentenceOf(error));
        },
      },
    );
  };
  return (
    <StepScreen
      title="Second source"
      repair={repair}
      onBack={onBack}
      foot={
        <FormFoot
          title="Save the second source"
          busy={add.isPending}
          offline={offline}
          problem={problem}
          onSend={send}
        />
      }
    >
      <Select
        label="Meter is at module"
        value={typed.modulePosition}
        options={positions.map((value) => ({
          value,
          label: reading.oddPositions.includes(value) ? `${value}, odd in the pack’s reading` : value,
        }))}
        onChange={(modulePosition) =>
          change({ modulePosition, groupVolts: groupsAt(pack, modulePosition).map(() => '') })
        }
      />
      {groups.map((group, at) => (
        <Field
          key={group}
          label={`G${group + 1}`}
          hint={`the pack says ${voltsText(reading.groupVolts[group] ?? 0, marks)}`}
          kind="decimal"
          unit="V"
          required
          value={typed.groupVolts[at] ?? ''}
          error={errors[`groupVolts.${at}`] ?? typedProblem(typed.groupVolts[at] ?? '') ?? undefined}
          onChangeText={(text) =>
            change({ groupVolts: groups.map((_, one) => (one === at ? text : (typed.groupVolts[one] ?? ''))) })
          }
        />
      ))}
      <FieldPair>
        <Field
          label="Healthy group"
          hint="takes the meters’ offset out"
          kind="whole"
          value={typed.healthyGroup}
          error={errors['healthyGroup.group']}
          onChangeText={(healthyGroup) => change({ healthyGroup })}
        />
        <Field
          label="Its volts"
          kind="decimal"
          unit="V"
          value={typed.healthyVolts}
          error={errors['healthyGroup.volts'] ?? typedProblem(typed.healthyVolts) ?? undefined}
          onChangeText={(text) => change({ healthyVolts: text })}
        />
      </FieldPair>
      <Select
        label="Read with"
        empty="Choose the meter"
        required
        value={typed.meterId || null}
        error={errors.meterId}
        options={[
          ...meters.map(({ id, name }) => ({ value: id, label: name })),
          { value: notKnown, label: 'not known' },
        ]}
        onChange={(meterId) => change({ meterId })}
      />
      <Select
        label="Meter points to"
        value={typed.pointsTo || 'same'}
        options={[
          { value: 'same', label: 'no other module' },
          ...positions
            .filter((one) => one !== typed.modulePosition)
            .map((value) => ({ value, label: `module ${value}` })),
        ]}
        error={errors.pointsTo}
        onChange={(one) => change({ pointsTo: one === 'same' ? '' : one })}
      />
      {verdict ? (
        <Txt bold tone={verdict.agrees ? 'ready' : 'alarm'} role="status">
          {verdict.text}
        </Txt>
      ) : null}
    </StepScreen>
  );
}
