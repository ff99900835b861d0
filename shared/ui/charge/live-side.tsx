import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { moment } from '../format/clock';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { isFlowing, isUnderWay } from './card-model';

/** What waits for a hand inside the charge: the clips to be moved, the current to be switched off. */
export function HandCallOut({
  charge,
  busy,
  disabled,
  onDone,
}: {
  charge: ChargeDto;
  busy: boolean;
  disabled: boolean;
  onDone: () => void;
}) {
  if (charge.nextHand === null) return null;
  return (
    <CallOut tone="amber" label="A hand is needed">
      <StageTag stage="check-due" text="A hand is needed" />
      <Txt kind="heading" style={{ marginVertical: 8 }}>
        {charge.nextHand}
      </Txt>
      <Button title="Done, go on" onPress={onDone} busy={busy} disabled={disabled} />
    </CallOut>
  );
}

/** After the current: since when it is off, as reckoned or as somebody said. */
export function CurrentOff({
  charge,
  now,
  busy,
  disabled,
  onOff,
}: {
  charge: ChargeDto;
  now: number;
  busy: boolean;
  disabled: boolean;
  onOff: () => void;
}) {
  const { zone, marks } = useFormats();
  if (charge.stage !== 'resting' || charge.currentEndAt === null) return null;
  const at = Date.parse(charge.currentEndAt);
  return (
    <View style={{ rowGap: 8, paddingVertical: 10 }}>
      <Txt>
        {`The current is off since ${moment(at, zone, now, marks)}, ${duration((now - at) / 1000, 'minute')} ago. The rest takes at least ${duration(charge.minRestS, 'minute')}.`}
      </Txt>
      <Button
        look="line"
        size="small"
        title="It was switched off only now"
        onPress={onOff}
        busy={busy}
        disabled={disabled}
      />
    </View>
  );
}

/** Look-in due or to come, and the tap that does it. */
export function LookInLine({
  charge,
  now,
  busy,
  disabled,
  onDone,
}: {
  charge: ChargeDto;
  now: number;
  busy: boolean;
  disabled: boolean;
  onDone: () => void;
}) {
  const { zone, marks } = useFormats();
  if (!isUnderWay(charge) || charge.nextLookInAt === null) return null;
  const at = Date.parse(charge.nextLookInAt);
  const left = Math.round((at - now) / 60_000);
  return (
    <View style={{ flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', columnGap: 12 }}>
      <Txt tone={left < 0 ? 'alarm' : 'ink2'} bold={left < 0}>
        {`Look-in ${moment(at, zone, now, marks)}, ${left < 0 ? `${-left} min over` : `in ${left} min`}`}
      </Txt>
      <Button look="line" size="small" title="Looked in" onPress={onDone} busy={busy} disabled={disabled} />
    </View>
  );
}

/** Who has the charge, and the way to a colleague. */
export function WhoHasIt({ charge, onHandOver }: { charge: ChargeDto; onHandOver: () => void }) {
  const open = isUnderWay(charge) || isFlowing(charge) || ['planned', 'queued', 'ready'].includes(charge.stage);
  return (
    <View style={{ flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', minHeight: 48 }}>
      <Txt tone="ink2">{charge.person ? `${charge.person.name} has it` : 'Nobody has it yet'}</Txt>
      {open ? <Link title="hand over" label="Hand the charge over to a colleague" onPress={onHandOver} /> : null}
    </View>
  );
}
