import { useFieldArray } from 'react-hook-form';
import { View } from 'react-native';
import type { ChannelDto, MeterDto } from '@/shared/contract/equipment';
import { Button } from '../primitives/button';
import { BoundField, BoundSelect, type TypedForm } from '../forms/bound';
import { ChannelFields } from './channel-fields';
import { emptyChannel, type ChargerTexts } from './charger-form';
import { FieldGrid } from './field-grid';

/** A charger with its channels. A channel taken away here is out of service once the form is saved. */
export function ChargerFields({
  form,
  meters,
  channels,
  readOnly,
}: {
  form: TypedForm<ChargerTexts>;
  meters: readonly MeterDto[];
  /** As they stand at the server: for who has them now. */
  channels: readonly ChannelDto[];
  readOnly: boolean;
}) {
  // The list's own key must not be called `id`: that is the channel's.
  const list = useFieldArray({ control: form.control, name: 'channels', keyName: 'key' });
  return (
    <View style={{ rowGap: 16 }}>
      <BoundField form={form} name="name" label="Name" required readOnly={readOnly} nextKey="next" />
      <FieldGrid two>
        <BoundField form={form} name="place" label="Place" hint="where it stands" readOnly={readOnly} nextKey="next" />
        <BoundSelect
          form={form}
          name="meterId"
          label="Its voltmeter"
          hint="among the meters"
          options={[
            { value: '', label: 'Not on the list' },
            ...meters.map(({ id, name }) => ({ value: id, label: name })),
          ]}
          readOnly={readOnly}
        />
      </FieldGrid>
      {list.fields.map((field, index) => (
        <ChannelFields
          key={field.key}
          form={form}
          index={index}
          held={channels.find((channel) => channel.id === field.id)?.heldBy ?? null}
          readOnly={readOnly}
          onRemove={list.fields.length > 1 ? () => list.remove(index) : undefined}
        />
      ))}
      {readOnly ? null : (
        <Button
          look="line"
          icon="plus"
          title="Add a channel"
          onPress={() => {
            // Most chargers have channels of one kind: the new one begins as the last, but for its name.
            const last = form.getValues('channels').at(-1) ?? emptyChannel;
            list.append({ ...last, id: undefined, name: '' }, { focusName: `channels.${list.fields.length}.name` });
          }}
        />
      )}
    </View>
  );
}
