import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { useController } from 'react-hook-form';
import { View } from 'react-native';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useAddPlace, useChangePlace, useRemovePlace, useStaffing } from '@/shared/client/staffing';
import { placeKindNames, placeKinds, placeSchema, type PlaceDto, type PlaceKind } from '@/shared/contract/staffing';
import { BoundField } from '@/shared/ui/forms/bound';
import { Field } from '@/shared/ui/primitives/field';
import { SegmentSwitch } from '@/shared/ui/primitives/segment-switch';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { ChangedMeanwhile, differences } from '@/shared/ui/workshop/changed-meanwhile';
import { FormFoot } from '@/shared/ui/workshop/form-foot';
import { FormScreen, Restored } from '@/shared/ui/workshop/form-screen';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { RemoveThing } from '@/shared/ui/workshop/remove-thing';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const list = '/workshop?section=places' as Href;
const names = { name: 'Name', kind: 'Kind' };

interface PlaceTexts {
  name: string;
  kind: PlaceKind;
  baseRev: number;
}
const texts = (of: PlaceDto | null): PlaceTexts => ({
  name: of?.name ?? '',
  kind: of?.kind ?? 'bay',
  baseRev: of?.rev ?? 0,
});
const words = ({ name, kind }: PlaceTexts) => ({ name, kind: placeKindNames[kind] });

/** A bay or a bench, or a new one (`new`). */
export default function Place() {
  const router = useRouter();
  const { id = 'new' } = useLocalSearchParams<{ id: string }>();
  const staffing = useStaffing();
  const onBack = () => (router.canGoBack() ? router.back() : router.replace(list));
  const place = staffing.data?.places.find((each) => each.id === id) ?? null;
  const state = partState(staffing);
  const missing = state === 'ready' && id !== 'new' && !place;
  if (state !== 'ready' || missing)
    return (
      <FormScreen
        title={id === 'new' ? 'New place' : 'Place'}
        onBack={onBack}
        what="the place"
        state={missing ? { failed: 'It is not on the list any more.' } : state}
        onRetry={() => void staffing.refetch()}
      >
        {null}
      </FormScreen>
    );
  return <PlaceForm key={id} place={place} onBack={onBack} />;
}

function PlaceForm({ place, onBack }: { place: PlaceDto | null; onBack: () => void }) {
  const toast = useToast();
  const gate = useGate('workshop:write');
  const add = useAddPlace();
  const change = useChangePlace();
  const remove = useRemovePlace();
  const [initial] = useState(() => texts(place));
  const f = useContractForm({
    schema: placeSchema,
    initial,
    draft: `place.${place?.id ?? 'new'}`,
    send: async (output) => {
      const rev = f.form.getValues('baseRev');
      const saved = place ? await change.mutateAsync({ ...output, id: place.id, rev }) : await add.mutateAsync(output);
      toast({ text: `${saved.name} is saved.` });
      onBack();
    },
  });
  const kind = useController({ control: f.form.control, name: 'kind' }).field;
  const present = isProblem(f.error) && f.error.status === 412 ? (f.error.present as PlaceDto) : null;
  const theirs = present ? texts(present) : null;
  return (
    <FormScreen
      title={place?.name ?? 'New place'}
      onBack={onBack}
      what="the place"
      state="ready"
      onRetry={() => {}}
      foot={
        gate.may ? (
          <FormFoot
            title="Save the place"
            busy={f.busy}
            wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
            problem={theirs ? null : f.problem}
            onPress={() => void f.submit()}
          />
        ) : undefined
      }
    >
      {gate.may ? null : <Txt tone="ink2">{whoMay(gate)}</Txt>}
      <Restored restored={f.restored} onAfresh={() => f.clear(texts(place))} />
      {theirs ? (
        <ChangedMeanwhile
          what="This place"
          differing={differences(names, words(theirs), words(f.form.getValues()))}
          busy={f.busy}
          onTakeTheirs={() => f.clear(theirs)}
          onKeepMine={() => {
            f.form.setValue('baseRev', theirs.baseRev);
            void f.submit();
          }}
        />
      ) : null}
      <BoundField
        form={f.form}
        name="name"
        label={names.name}
        hint="as people call it: bay 4, bench 2"
        required
        readOnly={!gate.may}
      />
      {gate.may ? (
        <View>
          <Txt kind="label" style={{ marginBottom: 4 }}>
            {names.kind}
          </Txt>
          <SegmentSwitch<PlaceKind>
            label={names.kind}
            value={kind.value}
            segments={placeKinds.map((value) => ({ value, label: placeKindNames[value] }))}
            onChange={kind.onChange}
          />
        </View>
      ) : (
        <Field label={names.kind} value={placeKindNames[kind.value]} onChangeText={() => {}} readOnly />
      )}
      <Txt kind="small" tone="ink2">
        One piece of work at a time is planned in it.
      </Txt>
      {gate.may && place ? (
        <RemoveThing
          name={place.name}
          thing="place"
          why={place.inUse ? 'Work that is not over needs it. Give that work another place first.' : null}
          fact="Work can no longer be planned in it. Work that is over keeps its name."
          busy={remove.isPending}
          problem={remove.error ? sentenceOf(remove.error) : null}
          onRemove={(done) =>
            remove.mutate(
              { id: place.id, rev: place.rev },
              {
                onSuccess: () => {
                  toast({ text: `${place.name} is removed.` });
                  onBack();
                },
                onSettled: done,
              },
            )
          }
        />
      ) : null}
    </FormScreen>
  );
}
