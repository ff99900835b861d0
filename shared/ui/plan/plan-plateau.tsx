import { View } from 'react-native';
import type { Refusal } from '@/calc/plan-types';
import { useFormats } from '../format/formats';
import { range } from '../format/quantities';
import { fixed } from '../format/number';
import { durationBand } from '../format/duration';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Duration, Num } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

/** Refused for nothing but that a voltage says too little here. */
export const isPlateau = (refusals: readonly Refusal[]): boolean =>
  refusals.length > 0 && refusals.every((refusal) => refusal.plateau !== undefined);

/** A voltage target on the flat of the curve: the band it would have, and the two ways on. Neither is chosen for anybody. */
export function PlanPlateau({
  refusals,
  onSoc,
  onAccept,
}: {
  refusals: readonly Refusal[];
  /** Types the pack's state of charge in place of its volts. */
  onSoc: () => void;
  /** Takes the wide band. */
  onAccept: () => void;
}) {
  const styles = useStyles();
  const { marks } = useFormats();
  const plateau = refusals[0]?.plateau;
  if (!plateau) return null;
  const percent = (share: number) => fixed(share * 100, 0, marks);
  return (
    <CallOut tone="amber" announce label="The voltage says too little here">
      <Txt kind="heading" heading={2}>
        The voltage says too little here
      </Txt>
      <View style={styles.numbers}>
        <View>
          <Txt kind="small" tone="ink2">
            It would take
          </Txt>
          <Duration seconds={plateau.totalS.p50} kind="numL" />
          <Txt tone="ink2" nowrap>
            {durationBand(plateau.totalS)}
          </Txt>
        </View>
        <View>
          <Txt kind="small" tone="ink2">
            and end at
          </Txt>
          <Num kind="numL" value={percent(plateau.soc.p50)} unit="%" />
          <Txt tone="ink2" nowrap>{`(${range(percent(plateau.soc.p10), percent(plateau.soc.p90), '%')})`}</Txt>
        </View>
      </View>
      {refusals.map(({ text }) => (
        <Txt key={text}>{text}</Txt>
      ))}
      <View style={styles.acts}>
        <Button title="Type the state of charge" onPress={onSoc} />
        <Button look="line" title="Plan it all the same" onPress={onAccept} />
      </View>
    </CallOut>
  );
}

const useStyles = makeStyles(() => ({
  numbers: { flexDirection: 'row', flexWrap: 'wrap', columnGap: 32, rowGap: 8, marginVertical: 10 },
  acts: { rowGap: 8, marginTop: 14 },
}));
