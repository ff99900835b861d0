import { useState } from 'react';
import { View } from 'react-native';
import type { GroupVerdict, PlanOption } from '@/calc/plan-types';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { CallOut } from '../primitives/call-out';
import { DurationWithBand } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { ribbonTwin } from '../wait-ribbon/twin';
import { WaitRibbon } from '../wait-ribbon/wait-ribbon';
import { needsWords, outsideWords } from './check-words';

/** What the outside groups need, and how long the soonest top-up takes. */
export function TopUpCallOut({
  groups,
  topUp,
  ruledOut,
}: {
  groups: readonly GroupVerdict[];
  /** The soonest way; null: not reckoned (yet). */
  topUp: PlanOption | null;
  /** Why there is none. */
  ruledOut: string | null;
}) {
  const styles = useStyles();
  const { marks } = useFormats();
  const [width, setWidth] = useState(0);
  return (
    <CallOut tone="amber" label="Outside the tolerance">
      <View onLayout={({ nativeEvent }) => setWidth(Math.round(nativeEvent.layout.width))}>
        <Txt kind="heading" heading={2}>
          {needsWords(groups, marks)}
        </Txt>
        <Txt tone="ink2">
          {topUp
            ? `${topUp.channelText}, then ${duration(topUp.restS)} rest`
            : (ruledOut ?? outsideWords({ groups: [...groups] }))}
        </Txt>
        {topUp ? (
          <>
            <View style={styles.time}>
              <DurationWithBand band={topUp.totalS} />
            </View>
            {width > 0 ? (
              <WaitRibbon
                segments={topUp.segments}
                band={topUp.totalS}
                fromS={0}
                toS={topUp.totalS.p90 * 1.03}
                width={width}
                height={34}
                padTop={8}
                hanging={topUp.direction === 'discharge'}
                twin={ribbonTwin({
                  segments: topUp.segments,
                  band: topUp.totalS,
                  hanging: topUp.direction === 'discharge',
                  at: (s) => `${duration(s)} from clipping on`,
                })}
              />
            ) : null}
          </>
        ) : null}
      </View>
    </CallOut>
  );
}

const useStyles = makeStyles(() => ({ time: { marginTop: 4, marginBottom: 8 } }));
