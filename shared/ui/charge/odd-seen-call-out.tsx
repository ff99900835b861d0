import { View } from 'react-native';
import type { ChargeDto, OddDto } from '@/shared/contract/charge';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { CallOut } from '../primitives/call-out';
import { Span, Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { channelsOf } from './card-model';
import { oddSeenWords } from './odd-seen-words';

/** The latest readings do not fit: what was seen, what was expected, what to check first. It goes once one fits again. */
export function OddSeenCallOut({ odd, charge, now }: { odd: OddDto; charge: ChargeDto; now: number }) {
  const { zone, marks } = useFormats();
  const words = oddSeenWords(odd, channelsOf(charge) || 'the charger', marks);
  const at = moment(Date.parse(odd.since), zone, now, marks);
  return (
    <CallOut tone="red" label="Odd reading">
      <View style={{ rowGap: 6 }}>
        <StageTag stage="overdue" text="Odd reading" />
        <Txt bold>{words.seen}</Txt>
        <Txt>
          <Span bold>Check first:</Span> {words.checkFirst}
        </Txt>
        <Txt kind="small" tone="ink2">
          {`${odd.readings === 1 ? `Read at ${at}` : `${odd.readings} readings in a row since ${at}`}; nothing is learned from ${odd.readings === 1 ? 'it' : 'them'}. Log another one after the check.`}
        </Txt>
      </View>
    </CallOut>
  );
}
