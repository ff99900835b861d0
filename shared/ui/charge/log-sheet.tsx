import { useState } from 'react';
import { useController, useFormState, useWatch, type UseFormReturn } from 'react-hook-form';
import { View } from 'react-native';
import type { ChargeDto, ReadingDto } from '@/shared/contract/charge';
import { clock, moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { amps, celsius, clipVolts } from '../format/quantities';
import { BoundField } from '../forms/bound';
import { GroupFields } from '../group-volts/group-fields';
import { asGroupForm, padAbove } from '../group-volts/group-form';
import { GroupPad } from '../group-volts/group-pad';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { Link } from '../primitives/link';
import { Select } from '../primitives/select';
import { TimeField } from '../primitives/time-field';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { useBreakpoint } from '../theme/use-breakpoint';
import { isFlowing } from './card-model';
import { nothingTyped, type LogValues } from './log-form';
import { OddCallOut } from './odd-call-out';
import { expectedNow, oddReading, type OddContext, type OddReading } from './odd-reading';

export interface LogSheetProps {
  charge: ChargeDto;
  form: UseFormReturn<LogValues, unknown, LogValues>;
  /** Meters of the workshop, to name the one that was read. */
  meters: readonly { id: string; name: string }[];
  now: number;
  context: OddContext;
  busy: boolean;
  /** Why it was not taken, where no field is to blame. */
  problem: string | null;
  /** Fields that need a change, in words; null: none. */
  wrong: string | null;
  /** The reading that is put right. */
  correcting: ReadingDto | null;
  /** It waits on this device until the connection is back. */
  offline: boolean;
  onSend: () => void;
  onClose: () => void;
}

const chargerDisplay = 'charger';
const notSaid = 'not-said';

/** A reading at the bench: the three numbers of the charger, and the groups where a meter is at hand. */
export function LogSheet(props: LogSheetProps) {
  const { charge, form, now, context, busy, problem, wrong, correcting, offline, onSend, onClose } = props;
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const [odd, setOdd] = useState<OddReading | null>(null);
  const { control } = form;
  const nothing = (useFormState({ control }).errors as Record<string, { message?: string } | undefined>)[nothingTyped]
    ?.message;
  const says = nothing ?? problem ?? wrong;
  const look = () => setOdd(correcting ? null : oddReading(form.getValues(), charge, context));
  const send = async () => {
    // A number that cannot be is said at its field; what can be and is odd is asked about before it is sent.
    const found = correcting || !(await form.trigger()) ? null : oddReading(form.getValues(), charge, context);
    if (found && found.seen !== odd?.seen) setOdd(found);
    else onSend();
  };
  const again = (field: OddReading['field']) => {
    form.setValue(field, '', { shouldDirty: true });
    form.setFocus(field);
    setOdd(null);
  };
  const title = correcting ? 'Correct a reading' : 'Log a reading';
  const expected = expectedNow(charge);
  const shown = [
    expected.volts === null ? '' : clipVolts(expected.volts, marks),
    expected.amps === null ? '' : amps(expected.amps, marks),
    expected.celsius === null ? '' : celsius(expected.celsius),
  ].filter(Boolean);
  return (
    <BottomSheet
      open
      title={title}
      aside={correcting ? `of ${moment(Date.parse(correcting.at), zone, now, marks)}` : clock(now, zone, marks)}
      onClose={onClose}
      scrimCloses={false}
      actions={
        <>
          {says ? (
            <Txt kind="label" tone="alarm" role="alert">
              {says}
            </Txt>
          ) : null}
          {odd ? (
            <>
              <Button title={odd.again} onPress={() => again(odd.field)} />
              <Button look="line" title="It reads so: log it" onPress={onSend} busy={busy} />
            </>
          ) : (
            <Button
              title={correcting ? 'Put it right' : offline ? 'Keep it on this device' : 'Log it'}
              onPress={() => void send()}
              busy={busy}
            />
          )}
        </>
      }
    >
      <View style={styles.three}>
        <View style={styles.wider}>
          <BoundField
            form={form}
            name="terminalVolts"
            label="At the clips"
            kind="decimal"
            unit="V"
            onLeave={look}
            nextKey="next"
            onSubmit={() => form.setFocus('amps')}
            autoFocus
          />
        </View>
        <View style={styles.one}>
          <BoundField
            form={form}
            name="amps"
            label="Current"
            kind="decimal"
            unit="A"
            onLeave={look}
            nextKey="next"
            onSubmit={() => form.setFocus('celsius')}
          />
        </View>
        <View style={styles.narrower}>
          <BoundField form={form} name="celsius" label="Module" kind="decimal" unit="°C" onLeave={look} />
        </View>
      </View>
      <Groups {...props} odd={odd} onLeave={look} />
      <MeterAndTime {...props} />
      {correcting ? (
        <View style={styles.part}>
          <BoundField
            form={form}
            name="reason"
            label="What was wrong"
            hint="The old reading stays in the log."
            maxLength={300}
          />
        </View>
      ) : null}
      {odd ? (
        <View style={styles.part}>
          <OddCallOut odd={odd} charge={charge} typed={form.getValues()} />
        </View>
      ) : null}
      {correcting || shown.length === 0 ? null : (
        <View style={styles.foot}>
          <Txt kind="small" tone="ink2">
            {`Expected ${shown.join(', ')}`}
          </Txt>
          {charge.nextLookInAt ? (
            <Txt kind="small" tone="ink2" nowrap>
              {`next look-in ${moment(Date.parse(charge.nextLookInAt), zone, now, marks)}`}
            </Txt>
          ) : null}
        </View>
      )}
    </BottomSheet>
  );
}

/** The groups, where somebody has a meter at hand: fields, or the pad where a phone would need too many of them. */
function Groups({ charge, form, odd, onLeave }: LogSheetProps & { odd: OddReading | null; onLeave: () => void }) {
  const styles = useStyles();
  const phone = useBreakpoint() === 'phone';
  const count = charge.groups.length;
  const many = phone && count > padAbove;
  const [open, setOpen] = useState(() => !many || form.getValues('groupVolts').some((text) => text !== ''));
  const { errors } = useFormState({ control: form.control });
  const groups = asGroupForm(form);
  const verdictOf = (group: number) => (odd?.group === group ? { inside: false, text: 'odd' } : null);
  const listError = (errors.groupVolts as { message?: string; root?: { message?: string } } | undefined)?.message;
  return (
    <View style={styles.part}>
      <View style={styles.head}>
        <Txt kind="label">{isFlowing(charge) ? 'Groups, while current flows' : 'Groups, at rest'}</Txt>
        {open ? (
          <Txt kind="small" tone="ink2">
            if a meter is at hand
          </Txt>
        ) : (
          <Link
            title={`type all ${count}`}
            label={`Type the voltages of all ${count} groups`}
            onPress={() => setOpen(true)}
          />
        )}
      </View>
      {listError ? (
        <Txt kind="label" tone="alarm" role="alert">
          {listError}
        </Txt>
      ) : null}
      {!open ? null : many ? (
        <GroupPad form={groups} count={count} verdictOf={verdictOf} onLeave={onLeave} />
      ) : (
        <GroupFields form={groups} count={count} columns={Math.min(count, 3)} verdictOf={verdictOf} onLeave={onLeave} />
      )}
    </View>
  );
}

/** Which meter was read, and when. */
function MeterAndTime({ form, meters, now, correcting }: LogSheetProps) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const {
    field: { ref, value, onChange, onBlur },
    fieldState,
  } = useController({ control: form.control, name: 'at' });
  const meterId = useWatch({ control: form.control, name: 'meterId' });
  return (
    <>
      <View style={[styles.pair, styles.part]}>
        <View style={styles.half}>
          <ReadWith form={form} meters={meters} />
        </View>
        <View style={styles.half}>
          <TimeField
            label="Read at"
            value={value}
            onChangeText={onChange}
            onBlur={onBlur}
            ref={ref}
            placeholder={correcting ? undefined : clock(now, zone, marks)}
            error={fieldState.error?.message}
          />
        </View>
      </View>
      {meterId === null ? null : (
        <View style={styles.part}>
          <TakenAt form={form} />
        </View>
      )}
    </>
  );
}

/** A meter may have been held at the supply or at the module: the leads lie in between. */
function TakenAt({ form }: Pick<LogSheetProps, 'form'>) {
  const {
    field: { ref, value, onChange },
  } = useController({ control: form.control, name: 'takenAt' });
  return (
    <Select
      label="Clips read at"
      value={value || notSaid}
      options={[
        { value: notSaid, label: 'not said' },
        { value: 'module', label: 'the module' },
        { value: 'supply', label: 'the supply' },
      ]}
      onChange={(chosen) => onChange(chosen === notSaid ? '' : chosen)}
      ref={ref}
    />
  );
}

function ReadWith({ form, meters }: Pick<LogSheetProps, 'form' | 'meters'>) {
  const {
    field: { ref, value, onChange },
    fieldState,
  } = useController({ control: form.control, name: 'meterId' });
  return (
    <Select
      label="Read with"
      value={value ?? chargerDisplay}
      options={[
        { value: chargerDisplay, label: 'The charger' },
        ...meters.map(({ id, name }) => ({ value: id, label: name })),
      ]}
      onChange={(chosen) => onChange(chosen === chargerDisplay ? null : chosen)}
      error={fieldState.error?.message}
      ref={ref}
    />
  );
}

const useStyles = makeStyles(() => ({
  three: { flexDirection: 'row', columnGap: 8, alignItems: 'flex-start' },
  wider: { flexGrow: 1.15, flexBasis: 0, minWidth: 0 },
  one: { flexGrow: 1, flexBasis: 0, minWidth: 0 },
  narrower: { flexGrow: 0.9, flexBasis: 0, minWidth: 0 },
  part: { marginTop: 14 },
  head: {
    flexDirection: 'row',
    justifyContent: 'space-between',
    alignItems: 'baseline',
    columnGap: 12,
    marginBottom: 6,
  },
  pair: { flexDirection: 'row', columnGap: 8, alignItems: 'flex-start' },
  half: { flexGrow: 1, flexBasis: 0, minWidth: 0 },
  foot: { flexDirection: 'row', justifyContent: 'space-between', columnGap: 12, marginTop: 12, flexWrap: 'wrap' },
}));
