import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { useWatch } from 'react-hook-form';
import { View } from 'react-native';
import { isConflict, sentenceOf } from '@/shared/client/api-problem';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useLink } from '@/shared/client/link';
import { useModuleTypes } from '@/shared/client/module-types';
import { useChangeSpare, useSpare } from '@/shared/client/spares';
import type { ModuleTypeDto } from '@/shared/contract/equipment';
import type { SpareDto } from '@/shared/contract/spare';
import { ScanButton } from '@/shared/screens/scan/scan-button';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ChangedMeanwhile } from '@/shared/ui/spare/changed-meanwhile';
import { FormFoot } from '@/shared/ui/spare/form-foot';
import { SpareFields } from '@/shared/ui/spare/spare-fields';
import { spareForm, typedOf } from '@/shared/ui/spare/spare-form';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Changes what is known of a spare. */
export default function EditSpare() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const spare = useSpare(id);
  const types = useModuleTypes();
  const back = () => (router.canGoBack() ? router.back() : router.replace(`/spares/${id}` as Href));
  if (spare.data && types.data) return <Form key={id} spare={spare.data} types={types.data} onBack={back} />;
  const failed = spare.isError ? spare : types;
  return (
    <Screen single header={<HeaderBar title="Edit" onBack={back} />}>
      {failed.isError ? (
        <ErrorState
          failed="The spare could not be read."
          toDo={sentenceOf(failed.error)}
          action={{ title: 'Try again', onPress: () => void failed.refetch(), busy: failed.isFetching }}
        />
      ) : (
        <Loading what="the spare" onRetry={() => void failed.refetch()} />
      )}
    </Screen>
  );
}

function Form({ spare, types, onBack }: { spare: SpareDto; types: readonly ModuleTypeDto[]; onBack: () => void }) {
  const change = useChangeSpare();
  const offline = useLink().state === 'down';
  // The state that was on screen when typing began: the server refuses where it has moved on since.
  const [base, setBase] = useState(spare);
  const f = useContractForm({
    schema: spareForm,
    initial: typedOf(base),
    draft: `spare.edit.${spare.id}`,
    send: async (output) => {
      await change.mutateAsync({ id: spare.id, rev: base.rev, ...output });
      onBack();
    },
  });
  const typeId = useWatch({ control: f.form.control, name: 'moduleTypeId' });
  const typed = useWatch({ control: f.form.control });
  const present = isConflict(f.error) ? (f.error.present as SpareDto | undefined) : undefined;
  const moved = present && present.rev !== base.rev ? present : undefined;
  return (
    <Screen
      single
      header={<HeaderBar title={`Edit ${spare.label}`} sub={spare.typeName} onBack={onBack} />}
      foot={
        <FormFoot
          title="Keep the changes"
          busy={f.busy}
          offline={offline}
          problem={
            moved
              ? 'Somebody has changed this spare meanwhile. Decide above.'
              : (f.problem ?? (f.wrong > 0 ? wrongSentence(f.wrong) : null))
          }
          onSend={() => void f.submit()}
        />
      }
    >
      <View style={{ rowGap: 16, paddingBottom: 16 }}>
        {moved ? (
          <ChangedMeanwhile
            typed={{ ...typedOf(base), ...typed }}
            present={typedOf(moved)}
            typeName={(id) => types.find((type) => type.id === id)?.name ?? id}
            onMine={() => setBase(moved)}
            onTheirs={() => {
              setBase(moved);
              f.clear(typedOf(moved));
            }}
          />
        ) : null}
        <SpareFields
          form={f.form}
          types={types}
          type={types.find((type) => type.id === typeId)}
          scan={
            <ScanButton
              onSpare={({ label }) => {
                f.form.setValue('label', label, { shouldDirty: true, shouldValidate: true });
                return null;
              }}
            />
          }
        />
      </View>
    </Screen>
  );
}
