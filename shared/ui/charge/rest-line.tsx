import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Txt } from '../primitives/txt';
import { enoughWords, isDueEarly, settlesWords } from './rest-words';

/** Where the groups will settle by the readings of the rest, and when that is enough; else what would tell it. */
export function RestLine({ charge, now }: { charge: ChargeDto; now: number }) {
  const { zone, marks } = useFormats();
  const { rest } = charge;
  if (charge.stage !== 'resting' && charge.stage !== 'check-due') return null;
  if (!rest)
    // Only once somebody has said that the current is off do readings tell of a rest.
    return charge.stage === 'resting' && charge.nextHand === null ? (
      <Txt kind="small" tone="ink2">
        Three readings of the groups during the rest tell where they settle, and often let the check come sooner.
      </Txt>
    ) : null;
  const due = isDueEarly(charge, now);
  return (
    <View role="group" aria-label="Where it settles">
      {settlesWords(rest, marks).map((line) => (
        <Txt key={line}>{line}</Txt>
      ))}
      <Txt bold={rest.restedEnough || due}>
        {enoughWords(rest, (instant) => moment(instant, zone, now, marks), due)}
      </Txt>
      <Txt kind="small" tone="ink2">
        {`From ${rest.readings} readings of the groups since the current is off; the band holds 8 of 10.`}
      </Txt>
    </View>
  );
}
