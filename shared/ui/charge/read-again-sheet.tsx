import { useController, type UseFormReturn } from 'react-hook-form';
import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { asGroupForm, padAbove } from '../group-volts/group-form';
import { BoundField } from '../forms/bound';
import { GroupFields } from '../group-volts/group-fields';
import { GroupPad } from '../group-volts/group-pad';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { Select } from '../primitives/select';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { useBreakpoint } from '../theme/use-breakpoint';
import type { CheckValues } from './check-form';

/** A new reading of the spare before it is clipped on: its temperature and its groups. */
export function ReadAgainSheet({
  charge,
  form,
  meters,
  busy,
  problem,
  wrong,
  onSend,
  onClose,
}: {
  charge: ChargeDto;
  form: UseFormReturn<CheckValues, unknown, CheckValues>;
  meters: readonly { id: string; name: string }[];
  busy: boolean;
  problem: string | null;
  wrong: string | null;
  onSend: () => void;
  onClose: () => void;
}) {
  const styles = useStyles();
  const phone = useBreakpoint() === 'phone';
  const count = charge.groups.length;
  const groups = asGroupForm(form);
  return (
    <BottomSheet
      open
      title={`Read ${charge.spare.label} again`}
      onClose={onClose}
      scrimCloses={false}
      actions={
        <>
          {problem || wrong ? (
            <Txt kind="label" tone="alarm" role="alert">
              {problem ?? wrong}
            </Txt>
          ) : null}
          <Button title="Keep the reading" onPress={onSend} busy={busy} />
        </>
      }
    >
      <View style={styles.stack}>
        <View style={styles.pair}>
          <View style={styles.half}>
            <BoundField form={form} name="celsius" label="Module is at" kind="decimal" unit="°C" autoFocus />
          </View>
          <View style={styles.half}>
            <MeterSelect form={form} meters={meters} />
          </View>
        </View>
        {phone && count > padAbove ? (
          <GroupPad form={groups} count={count} />
        ) : (
          <GroupFields form={groups} count={count} columns={Math.min(count, 3)} />
        )}
      </View>
    </BottomSheet>
  );
}

const none = 'none';

/** The meter that the groups are read with. */
export function MeterSelect({
  form,
  meters,
  hint,
}: {
  form: UseFormReturn<CheckValues, unknown, CheckValues>;
  meters: readonly { id: string; name: string }[];
  hint?: string;
}) {
  const {
    field: { ref, value, onChange, onBlur },
    fieldState,
  } = useController({ control: form.control, name: 'meterId' });
  return (
    <Select
      label="Meter"
      value={value ?? none}
      options={[{ value: none, label: 'Not named' }, ...meters.map(({ id, name }) => ({ value: id, label: name }))]}
      onChange={(chosen) => onChange(chosen === none ? null : chosen)}
      onBlur={onBlur}
      ref={ref}
      hint={hint}
      error={fieldState.error?.message}
    />
  );
}

const useStyles = makeStyles(() => ({
  stack: { rowGap: 14, paddingBottom: 4 },
  pair: { flexDirection: 'row', columnGap: 8, alignItems: 'flex-start' },
  half: { flexGrow: 1, flexBasis: 0, minWidth: 0 },
}));
