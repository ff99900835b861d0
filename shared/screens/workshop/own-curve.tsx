import { lazy, Suspense, useState } from 'react';
import { View } from 'react-native';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useDraft } from '@/shared/client/drafts';
import { useRemoveOwnCurve, useSaveOwnCurve } from '@/shared/client/module-types';
import type { ModuleTypeDto } from '@/shared/contract/equipment';
import { Button } from '@/shared/ui/primitives/button';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import type { CurveInput } from '@/shared/ui/workshop/curve-layout';
import type { CurveDraft } from '@/shared/ui/workshop/own-curve-sheet';

const OwnCurveSheet = lazy(() =>
  import('@/shared/ui/workshop/own-curve-sheet').then((part) => ({ default: part.OwnCurveSheet })),
);

const noDraft: CurveDraft = { text: '', fileName: '' };

/** The server's sentences by row; where it has none, its one sentence. */
function sentencesOf(error: unknown): string[] {
  if (!error) return [];
  const fields = isProblem(error) ? Object.values(error.fields) : [];
  return fields.length > 0 ? fields : [sentenceOf(error)];
}

/** How a type gets a curve of the workshop's own, another one, or the published one again. */
export function OwnCurve({
  type,
  rev,
  input,
  onSaved,
}: {
  type: ModuleTypeDto;
  /** Revision that the form beside it stands on. */
  rev: number;
  /** Limits and capacity as they are typed. */
  input: CurveInput;
  /** The type as it stands now: the form goes on from its revision. */
  onSaved: (type: ModuleTypeDto) => void;
}) {
  const toast = useToast();
  const draft = useDraft(`own-curve.${type.id}`, noDraft);
  const save = useSaveOwnCurve();
  const remove = useRemoveOwnCurve();
  const [sheet, setSheet] = useState<'curve' | 'remove' | null>(null);
  const close = () => {
    setSheet(null);
    save.reset();
    remove.reset();
  };
  return (
    <View style={{ flexDirection: 'row', flexWrap: 'wrap', columnGap: 8, rowGap: 8 }}>
      <Button
        look="line"
        size="small"
        icon="upload"
        title={type.ownCurve ? 'Another curve' : 'Own curve from a CSV'}
        onPress={() => setSheet('curve')}
      />
      {type.ownCurve ? (
        <Button look="line" size="small" title="Take the own curve off" onPress={() => setSheet('remove')} />
      ) : null}
      {sheet === 'curve' ? (
        <Suspense fallback={null}>
          <OwnCurveSheet
            open
            input={input}
            draft={draft.value}
            onDraft={draft.set}
            busy={save.isPending}
            problem={sentencesOf(save.error)}
            onClose={close}
            onSave={(csv) =>
              save.mutate(
                { id: type.id, rev, csv },
                {
                  onSuccess: (saved) => {
                    draft.clear();
                    close();
                    onSaved(saved);
                    toast({ text: `Plans of ${saved.name} go by this curve now.` });
                  },
                },
              )
            }
          />
        </Suspense>
      ) : null}
      <ConfirmSheet
        open={sheet === 'remove'}
        title="Take the own curve off?"
        fact="Plans go by the published curve again. Charges that run keep the curve they were planned with."
        confirm="Take it off"
        safe="Keep it"
        busy={remove.isPending}
        onClose={close}
        onConfirm={() =>
          remove.mutate(
            { id: type.id, rev },
            {
              onSuccess: (saved) => {
                close();
                onSaved(saved);
                toast({ text: 'The published curve rules again.' });
              },
            },
          )
        }
      >
        {remove.error ? (
          <Txt kind="label" tone="alarm" role="alert">
            {sentenceOf(remove.error)}
          </Txt>
        ) : null}
      </ConfirmSheet>
    </View>
  );
}
