import { lazy, Suspense, useMemo, useState } from 'react';
import { View } from 'react-native';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useDraft } from '@/shared/client/drafts';
import { useLink } from '@/shared/client/link';
import { useMeters } from '@/shared/client/meters';
import { useAddPackReading } from '@/shared/client/repairs';
import { positionsOf } from '@/shared/contract/pack';
import type { RepairPageDto } from '@/shared/contract/repair';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { Circumstances } from '@/shared/ui/pack-reading/circumstances';
import { canPickBytes, pickBytes } from '@/shared/ui/pack-reading/pick-bytes';
import { checkedText, MOST_BYTES, textOfBytes } from '@/shared/ui/pack-reading/reading-bytes';
import {
  checkedReading,
  emptyReadingTyped,
  nextStage,
  openSentence,
  type ReadingTyped,
  type Way,
} from '@/shared/ui/pack-reading/reading-typed';
import { SoFar } from '@/shared/ui/pack-reading/so-far';
import { TypedPad, typedProblem } from '@/shared/ui/pack-reading/typed-pad';
import { Button } from '@/shared/ui/primitives/button';
import { Field } from '@/shared/ui/primitives/field';
import { Rule } from '@/shared/ui/primitives/rule';
import { SegmentSwitch } from '@/shared/ui/primitives/segment-switch';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { FormFoot } from '@/shared/ui/spare/form-foot';
import { useReadingText } from './use-reading-text';

const Understood = lazy(() =>
  import('@/shared/ui/pack-reading/understood').then((part) => ({ default: part.Understood })),
);

const ways: { value: Way; label: string }[] = [
  { value: 'type', label: 'Type' },
  { value: 'paste', label: 'Paste' },
  { value: 'upload', label: 'Upload' },
];

/** Enters the voltages of a pack's groups: typed, pasted or from a file. Nothing is kept before Save. */
export function ReadingForm({
  repair,
  onBack,
  onSaved,
}: {
  repair: RepairPageDto;
  onBack: () => void;
  onSaved: () => void;
}) {
  const { pack } = repair;
  const { zone, marks } = useFormats();
  const now = useNow(60_000);
  const positions = useMemo(() => positionsOf(pack), [pack]);
  const initial = useMemo(
    () => {
      const fitted = repair.steps.some(({ step, state }) => step === 'fit' && state === 'done');
      const next = nextStage(repair.readings, fitted);
      return emptyReadingTyped(pack.groupCount, next.stage, next.balanceCount);
    },
    // What stands there at first; a repair that changes meanwhile must not empty the form.
    // eslint-disable-next-line react-hooks/exhaustive-deps
    [repair.id, pack.groupCount],
  );
  const draft = useDraft<ReadingTyped>(`repair.reading.${repair.id}.${pack.groupCount}`, initial);
  const typed = draft.value;
  const change = (part: Partial<ReadingTyped>) => draft.set((last) => ({ ...last, ...part }));
  const meters = useMeters();
  const add = useAddPackReading();
  const offline = useLink().state === 'down';
  const [problem, setProblem] = useState<string | null>(null);
  const [unread, setUnread] = useState<string | null>(null);
  const [errors, setErrors] = useState<Record<string, string>>({});
  const table = typed.way === 'paste' ? typed.pasted : typed.way === 'upload' ? (typed.file?.text ?? '') : '';
  const pasted = typed.way === 'paste' && table.trim() !== '' ? checkedText('What was pasted', table) : null;
  const { read, failed } = useReadingText(pasted?.ok === false ? '' : table, {
    groupCount: pack.groupCount,
    separator: typed.separator,
    unit: typed.unit,
  });

  const pick = () =>
    pickBytes('.csv,.txt,text/csv,text/plain', MOST_BYTES).then(
      (picked) => {
        if (!picked) return;
        const text = textOfBytes(picked.name, picked.bytes);
        setUnread(text.ok ? null : text.sentence);
        setProblem(null);
        // What stood there stays: a file that is no table takes nothing away.
        if (text.ok) change({ file: { name: picked.name, text: text.text }, separator: null, unit: null });
      },
      () => setUnread('The file could not be read. Choose it again, or paste its rows.'),
    );

  /** The voltages to send, or why there are none yet. */
  const entered = (): { volts: readonly (string | number)[] } | { why: string; group?: number } => {
    if (typed.way === 'type') {
      const open = typed.typed.flatMap((text, group) => (text.trim() === '' ? [group] : []));
      const wrong = typed.typed.findIndex((text) => typedProblem(text) !== null);
      if (wrong >= 0) return { why: `G${wrong + 1}: ${typedProblem(typed.typed[wrong]!)}`, group: wrong };
      const why = openSentence(open);
      return why === null ? { volts: typed.typed } : { why, group: open[0] };
    }
    if (pasted?.ok === false) return { why: pasted.sentence };
    if (read === null) return { why: typed.way === 'paste' ? 'Paste the table first.' : 'Choose a file first.' };
    return read.refusal === null ? { volts: read.groupVolts } : { why: read.refusal };
  };

  const save = () => {
    const got = entered();
    setErrors({});
    if ('why' in got) {
      setProblem(got.why);
      if (got.group !== undefined) change({ present: got.group });
      return;
    }
    const checked = checkedReading(typed, got.volts);
    if (!checked.ok) {
      setErrors(checked.fields);
      setProblem(Object.values(checked.fields)[0] ?? null);
      return;
    }
    setProblem(null);
    add.mutate(
      { id: repair.id, ...checked.input },
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
    <Screen
      single
      header={
        <HeaderBar
          title="Pack reading"
          sub={`${repair.number} · ${pack.groupCount} groups, ${pack.moduleCount} modules`}
          onBack={onBack}
          clock={clock(now, zone, marks)}
        />
      }
      foot={
        <FormFoot title="Save the reading" busy={add.isPending} offline={offline} problem={problem} onSend={save} />
      }
    >
      <View style={{ rowGap: 14, paddingBottom: 16 }}>
        <SegmentSwitch
          label="Way of entry"
          value={typed.way}
          segments={ways}
          onChange={(way) => {
            setProblem(null);
            change({ way, separator: null, unit: null });
          }}
        />
        {typed.way === 'type' ? (
          <>
            <SoFar typed={typed.typed} />
            <TypedPad
              values={typed.typed}
              present={typed.present}
              positions={positions}
              onGo={(present) => change({ present })}
              onPut={(from, texts) => {
                setProblem(null);
                draft.set((last) => ({
                  ...last,
                  typed: last.typed.map((text, group) => texts[group - from] ?? text),
                  present: texts.length > 1 ? Math.min(pack.groupCount - 1, from + texts.length) : last.present,
                }));
              }}
            />
          </>
        ) : null}
        {typed.way === 'paste' ? (
          <Field
            label="Paste the table"
            hint="a group a line, or all groups in one line; V or mV"
            multiline
            lines={6}
            value={typed.pasted}
            error={pasted?.ok === false ? pasted.sentence : undefined}
            onChangeText={(text) => {
              setProblem(null);
              change({ pasted: text });
            }}
          />
        ) : null}
        {typed.way === 'upload' ? (
          <View style={{ rowGap: 8 }}>
            {canPickBytes ? (
              <Button
                look="line"
                icon="upload"
                title={typed.file ? 'Choose another file' : 'Choose a CSV file'}
                onPress={() => void pick()}
              />
            ) : (
              <Txt>Files are chosen in a browser. Paste the table here instead.</Txt>
            )}
            {typed.file ? (
              <Txt kind="small" tone="ink2">
                {typed.file.name}
              </Txt>
            ) : null}
            {unread ? (
              <Txt kind="label" tone="alarm" role="alert">
                {unread}
              </Txt>
            ) : null}
          </View>
        ) : null}
        {failed ? (
          <Txt tone="alarm" role="alert">
            The part that reads tables could not be fetched. Load the page again; what you entered is kept.
          </Txt>
        ) : null}
        {read ? (
          <Suspense fallback={null}>
            <Understood
              read={read}
              positions={positions}
              onSeparator={(separator) => change({ separator })}
              onUnit={(unit) => change({ unit })}
            />
          </Suspense>
        ) : null}
        <Rule />
        <Circumstances typed={typed} meters={meters.data ?? []} errors={errors} onChange={change} />
      </View>
    </Screen>
  );
}
