import { useGate } from '@/shared/client/gate';
import { usePackTypes } from '@/shared/client/pack-types';
import { partState } from '@/shared/client/part-state';
import { useFormats } from '@/shared/ui/format/formats';
import { Link } from '@/shared/ui/primitives/link';
import { Searched } from '@/shared/ui/primitives/searched';
import { Table } from '@/shared/ui/primitives/table';
import { aimWords } from '@/shared/ui/repair/pack-form';
import { packWords } from '@/shared/ui/repair/repair-words';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { SectionBlock } from '@/shared/ui/workshop/section-block';
import { AddLink } from './add-link';
import type { PartProps } from './part-props';
import { NothingYet } from './part-words';
import { useGo } from './use-go';

/** The workshop's own templates of packs. */
export function PackTypesPart({ titled }: PartProps) {
  const go = useGo();
  const { marks } = useFormats();
  const gate = useGate('equipment:write');
  const types = usePackTypes();
  return (
    <SectionBlock
      id="pack-types"
      title="Pack types"
      titled={titled}
      aside={<AddLink title="add a pack type" href="/workshop/pack-types/new" may={gate.may} />}
      state={partState(types)}
      what="the pack types"
      onRetry={() => void types.refetch()}
      note={whoMay(gate)}
    >
      {types.data?.length === 0 ? (
        <NothingYet words="No pack type yet. A repair then takes the pack’s own numbers." />
      ) : (
        <Searched
          items={types.data ?? []}
          label="Name or module type"
          one="pack type"
          textsOf={({ name, pack }) => [name, pack.moduleTypeName]}
        >
          {(found) => (
            <Table
              label="Pack types"
              rows={found}
              rowKey={({ id }) => id}
              columns={[
                { key: 'name', title: 'Name', cell: ({ name }) => name, share: 1.4 },
                {
                  key: 'pack',
                  title: 'Groups and modules',
                  cell: ({ pack }) => packWords(pack),
                  share: 1.6,
                  tone: 'ink2',
                },
                {
                  key: 'type',
                  title: 'Module type',
                  cell: ({ pack }) => pack.moduleTypeName ?? 'not known',
                  tone: 'ink2',
                },
                { key: 'aim', title: 'Aim', cell: ({ pack }) => aimWords(pack, marks), tone: 'ink2' },
                {
                  key: 'edit',
                  title: 'Change',
                  quietTitle: true,
                  width: 56,
                  phone: 'value',
                  cell: ({ id, name }) => (
                    <Link
                      kind="small"
                      tight
                      align="right"
                      title={gate.may ? 'edit' : 'look'}
                      label={`${gate.may ? 'Edit' : 'Look at'} ${name}`}
                      onPress={() => go(`/workshop/pack-types/${id}`)}
                    />
                  ),
                },
              ]}
            />
          )}
        </Searched>
      )}
    </SectionBlock>
  );
}
