import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useSaveRepairs, type RepairFilter } from '@/shared/client/repairs';
import { useCan } from '@/shared/client/session';
import { Button } from '@/shared/ui/primitives/button';
import { Txt } from '@/shared/ui/primitives/txt';

/** Saves the list as a table, all its pages; only for those who may take it out of the workshop. */
export function ExportLink({ filter, offline }: { filter: RepairFilter; offline: boolean }) {
  const may = useCan('repair:export');
  const save = useSaveRepairs();
  if (!may) return null;
  return (
    <View style={{ rowGap: 4, alignItems: 'flex-start' }}>
      {save.error ? (
        <Txt kind="label" tone="alarm" role="alert">
          {sentenceOf(save.error)}
        </Txt>
      ) : null}
      <Button
        look="line"
        size="small"
        icon="download"
        title="Save as CSV"
        disabled={offline}
        describedBy={offline ? 'export-why' : undefined}
        busy={save.isPending}
        onPress={() => save.mutate(filter)}
      />
      {offline ? (
        <Txt kind="small" tone="ink2" nativeID="export-why">
          No connection: the table can be saved when it is back.
        </Txt>
      ) : null}
    </View>
  );
}
