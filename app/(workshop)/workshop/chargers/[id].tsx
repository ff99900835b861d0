import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { View } from 'react-native';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useCharger, useRetireCharger, useSaveCharger } from '@/shared/client/chargers';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { useMeters } from '@/shared/client/meters';
import { partState } from '@/shared/client/part-state';
import { chargerSchema, type ChargerDto, type MeterDto } from '@/shared/contract/equipment';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { ChangedMeanwhile, differences } from '@/shared/ui/workshop/changed-meanwhile';
import { ChargerFields } from '@/shared/ui/workshop/charger-fields';
import { chargerTexts, chargerWords, type ChargerTexts } from '@/shared/ui/workshop/charger-form';
import { FormFoot } from '@/shared/ui/workshop/form-foot';
import { FormScreen, Restored } from '@/shared/ui/workshop/form-screen';
import { whoMay } from '@/shared/ui/workshop/may-change';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const list = '/workshop?section=chargers' as Href;

/** A charger with its channels, or a new one (`new`). */
export default function Charger() {
  const router = useRouter();
  const { id = 'new' } = useLocalSearchParams<{ id: string }>();
  const fresh = id === 'new';
  const charger = useCharger(fresh ? '' : id);
  const meters = useMeters();
  const onBack = () => (router.canGoBack() ? router.back() : router.replace(list));
  const state = fresh ? partState(meters) : partState(charger, meters);
  if (state !== 'ready' || !meters.data)
    return (
      <FormScreen
        title={fresh ? 'New charger' : 'Charger'}
        onBack={onBack}
        what="the charger"
        state={state}
        onRetry={() => {
          void meters.refetch();
          if (!fresh) void charger.refetch();
        }}
      >
        {null}
      </FormScreen>
    );
  return <ChargerForm key={id} charger={charger.data ?? null} meters={meters.data} onBack={onBack} />;
}

function ChargerForm({
  charger,
  meters,
  onBack,
}: {
  charger: ChargerDto | null;
  meters: readonly MeterDto[];
  onBack: () => void;
}) {
  const toast = useToast();
  const { marks } = useFormats();
  const gate = useGate('equipment:write');
  const save = useSaveCharger();
  const [initial] = useState<ChargerTexts>(() => chargerTexts(charger, marks));
  const f = useContractForm({
    schema: chargerSchema,
    initial,
    draft: `charger.${charger?.id ?? 'new'}`,
    send: async (output) => {
      const rev = f.form.getValues('baseRev');
      // The select knows no null: its empty value is no meter.
      const input = { ...output, meterId: output.meterId || null };
      const saved = await save.mutateAsync(charger ? { ...input, id: charger.id, rev } : input);
      toast({ text: `${saved.name} is saved.` });
      onBack();
    },
  });
  const present = isProblem(f.error) && f.error.status === 412 ? (f.error.present as ChargerDto) : null;
  const theirs = present ? chargerTexts(present, marks) : null;
  const verb = charger?.retired ? 'Bring it back into service' : 'Save the charger';
  const differing = () => {
    if (!theirs) return [];
    const [there, here] = [chargerWords(theirs, meters), chargerWords(f.form.getValues(), meters)];
    return differences({ ...there.names, ...here.names }, there.words, here.words);
  };
  return (
    <FormScreen
      title={charger?.name ?? 'New charger'}
      sub={charger?.retired ? 'out of service' : charger ? (charger.place ?? undefined) : undefined}
      onBack={onBack}
      what="the charger"
      state="ready"
      onRetry={() => {}}
      foot={
        gate.may ? (
          <FormFoot
            title={verb}
            busy={f.busy}
            wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
            problem={theirs ? null : f.problem}
            onPress={() => void f.submit()}
          />
        ) : undefined
      }
    >
      {gate.may ? null : <Txt tone="ink2">{whoMay(gate)}</Txt>}
      <Restored restored={f.restored} onAfresh={() => f.clear(chargerTexts(charger, marks))} />
      {theirs ? (
        <ChangedMeanwhile
          what="This charger"
          differing={differing()}
          busy={f.busy}
          onTakeTheirs={() => f.clear(theirs)}
          onKeepMine={() => {
            f.form.setValue('baseRev', theirs.baseRev);
            void f.submit();
          }}
        />
      ) : null}
      <ChargerFields form={f.form} meters={meters} channels={charger?.channels ?? []} readOnly={!gate.may} />
      {gate.may && charger && !charger.retired ? <Retire charger={charger} /> : null}
    </FormScreen>
  );
}

function Retire({ charger }: { charger: ChargerDto }) {
  const router = useRouter();
  const toast = useToast();
  const retire = useRetireCharger();
  const [asked, setAsked] = useState(false);
  const held = charger.channels.filter((channel) => channel.heldBy);
  const why =
    held.length > 0
      ? `${held.map((channel) => `${channel.heldBy?.title} has ${channel.name}`).join(', ')}. Take the charger out of service after that.`
      : null;
  return (
    <View style={{ rowGap: 6 }}>
      {why ? (
        <Txt kind="small" tone="ink2" nativeID="retire-why">
          {why}
        </Txt>
      ) : null}
      <Button
        look="line"
        title="Take the charger out of service"
        disabled={why !== null}
        describedBy={why ? 'retire-why' : undefined}
        onPress={() => setAsked(true)}
      />
      <ProblemLine text={retire.error ? sentenceOf(retire.error) : null} />
      <ConfirmSheet
        open={asked}
        title={`Take ${charger.name} out of service?`}
        fact="Plans no longer offer it. Its past charges keep its name, and it can be brought back."
        confirm="Take it out of service"
        safe="Keep it"
        busy={retire.isPending}
        onClose={() => setAsked(false)}
        onConfirm={() =>
          retire.mutate(
            { id: charger.id, rev: charger.rev },
            {
              onSuccess: () => {
                toast({ text: `${charger.name} is out of service.` });
                router.replace(list);
              },
              onSettled: () => setAsked(false),
            },
          )
        }
      />
    </View>
  );
}
