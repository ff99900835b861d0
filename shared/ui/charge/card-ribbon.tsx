import { useState } from 'react';
import { View } from 'react-native';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { clock } from '../format/clock';
import { useFormats } from '../format/formats';
import { clockTicks } from '../wait-ribbon/ticks';
import { TimeAxis } from '../wait-ribbon/time-axis';
import { ribbonTwin } from '../wait-ribbon/twin';
import { WaitRibbon } from '../wait-ribbon/wait-ribbon';
import { cardRibbon } from './card-drawings';

/** The ribbon of one charge on its own axis, as wide as its place. */
export function CardRibbon({
  card,
  now,
  height = 56,
  axis = true,
  stale = false,
}: {
  card: ChargeCardDto;
  /** Server's epoch ms; one a minute is enough. */
  now: number;
  height?: number;
  axis?: boolean;
  stale?: boolean;
}) {
  const { zone, marks } = useFormats();
  const [width, setWidth] = useState(0);
  const zero = Date.parse(card.startedAt ?? card.clipOnAt);
  const ribbon = cardRibbon(card, now, zero);
  const at = (s: number) => clock(zero + s * 1000, zone, marks);
  return (
    <View onLayout={({ nativeEvent }) => setWidth(Math.round(nativeEvent.layout.width))} style={{ minHeight: height }}>
      {width === 0 ? null : (
        <>
          <WaitRibbon
            {...ribbon}
            width={width}
            height={height}
            padTop={ribbon.lookIns.length > 0 ? 18 : 8}
            padBottom={ribbon.nowS === null ? 0 : 12}
            stale={stale}
            twin={ribbonTwin({ ...ribbon, at })}
          />
          {axis ? (
            <TimeAxis
              ticks={clockTicks({ zeroInstant: zero, fromS: ribbon.fromS, toS: ribbon.toS, width, zone, marks })}
              fromS={ribbon.fromS}
              toS={ribbon.toS}
              width={width}
            />
          ) : null}
        </>
      )}
    </View>
  );
}
