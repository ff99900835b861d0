import { View } from 'react-native';
import type { EstimateDto, EstimateInput, EstimateWayDto } from '@/shared/contract/estimate';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { ratedAh, share } from '../format/quantities';
import { doubtWords } from '../plan/way-words';
import { CallOut, Caution } from '../primitives/call-out';
import { Span, Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';

/** Which numbers were guessed, which makes most of the band, and every caution. */
export function EstimateTrust({
  estimate,
  way,
  input,
}: {
  estimate: EstimateDto;
  way: EstimateWayDto;
  input: EstimateInput;
}) {
  const { marks } = useFormats();
  const doubt = doubtWords[way.dominant];
  const rest = way.segments.filter(({ kind }) => kind === 'rest').reduce((sum, { fromS, toS }) => sum + toS - fromS, 0);
  // Said above in the words of six numbers: nobody was asked for a measurement here.
  const cautions = estimate.cautions.filter(({ code }) => code !== 'unknown-health');
  return (
    <View style={{ rowGap: 8 }}>
      <Txt tone="ink2">
        <Span bold tone="ink">
          The capacity is guessed.
        </Span>
        {` ${ratedAh(input.ratedAh, marks)} is off the label, taken at ${share(input.healthPercent / 100)}. A rest of ${duration(rest)} is included. Most of the band comes from ${doubt.name}.`}
        {way.narrowsByS >= 60 ? ` ${doubt.advice} would narrow it by ${duration(way.narrowsByS)}.` : ''}
        {' Read spare and pack with the same meter: its offset then cancels.'}
      </Txt>
      {cautions.map((caution) => (
        <Caution key={caution.text}>{caution.text}</Caution>
      ))}
    </View>
  );
}

/** No time: the numbers rule it out, or the charger cannot do it. */
export function EstimateRefused({ estimate }: { estimate: EstimateDto }) {
  const refused = estimate.refusals.length > 0;
  const texts = refused ? estimate.refusals.map(({ text }) => text) : estimate.ruledOut;
  return (
    <CallOut tone={refused ? 'red' : 'amber'} label={refused ? 'Not to be charged' : 'No time'}>
      {refused ? <StageTag stage="overdue" text="Not to be charged" /> : null}
      <View style={{ rowGap: 6, marginTop: refused ? 10 : 0 }}>
        {texts.map((text) => (
          <Txt key={text} bold>
            {text}
          </Txt>
        ))}
      </View>
    </CallOut>
  );
}
