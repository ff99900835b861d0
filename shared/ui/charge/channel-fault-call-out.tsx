import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Span, Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { isFlowing } from './card-model';

export type ChargeChannel = ChargeDto['channels'][number];

/** A channel of this charge is out of order: who said so, what was seen, what to check first. */
export function ChannelFaultCallOut({
  charge,
  channel,
  now,
  mayClear,
  busy,
  disabled,
  problem,
  onWorks,
}: {
  charge: ChargeDto;
  channel: ChargeChannel & { fault: NonNullable<ChargeChannel['fault']> };
  now: number;
  /** Who gives out channels says that it works again. */
  mayClear: boolean;
  busy: boolean;
  disabled: boolean;
  problem: string | null;
  onWorks: () => void;
}) {
  const { zone, marks } = useFormats();
  const { name, fault } = channel;
  const at = moment(Date.parse(fault.at), zone, now, marks);
  const flows = isFlowing(charge) && charge.channelNames.includes(name);
  return (
    <CallOut tone={flows ? 'red' : 'amber'} label={`${name} is out of order`}>
      <View style={{ rowGap: 6 }}>
        <StageTag stage={flows ? 'overdue' : 'check-due'} text={`${name} is out of order`} />
        <Txt bold>{fault.seen}</Txt>
        <Txt>
          <Span bold>Check first:</Span>{' '}
          {flows
            ? `that ${name} is off at the charger, then the clips and the module for warmth and smell. Then hold or stop the charge.`
            : `whether ${name} works again, then plan what is left on another channel.`}
        </Txt>
        <Txt kind="small" tone="ink2">
          {`${fault.by?.name ?? 'Somebody'} said so at ${at}. Plans leave ${name} out${mayClear ? '' : ' until a foreman says that it works'}.`}
        </Txt>
        {mayClear ? (
          <Button
            look="line"
            size="small"
            title={`${name} works again`}
            busy={busy}
            disabled={disabled}
            onPress={onWorks}
          />
        ) : null}
        {problem ? (
          <Txt kind="label" tone="alarm" role="alert">
            {problem}
          </Txt>
        ) : null}
      </View>
    </CallOut>
  );
}
