import { useState } from 'react';
import { View } from 'react-native';
import type { PlanOption } from '@/calc/plan-types';
import { ChargePicture } from '../charts/charge-picture';
import { ChartFrame } from '../charts/chart-frame';
import { restBandOf } from '../charts/picture-rows';
import { PictureTable } from '../charts/picture-table';
import { clock } from '../format/clock';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { volts } from '../format/quantities';
import { clockTicks, spanTicks } from '../wait-ribbon/ticks';
import { spanStep } from './span-step';

/** Volts and amps of a way against the clock, or against the time since clip-on. Loaded late: it brings the charts. */
export function PlanPicture({
  heading,
  option,
  clipOnAt,
  targetVolts,
}: {
  heading: string;
  option: Pick<PlanOption, 'totalS' | 'segments' | 'trace'>;
  /** Epoch ms; null where nobody has said when, as in the quick estimate. */
  clipOnAt: number | null;
  targetVolts: number;
}) {
  const { zone, marks } = useFormats();
  const [width, setWidth] = useState(0);
  const toS = Math.max(option.totalS.p90, option.trace.at(-1)?.s ?? 0);
  const at = (s: number) =>
    clipOnAt === null ? (s < 60 ? 'clip on' : duration(s)) : clock(clipOnAt + s * 1000, zone, marks);
  const fewer = width - 40;
  return (
    <View onLayout={({ nativeEvent }) => setWidth(Math.round(nativeEvent.layout.width))}>
      {width === 0 || option.trace.length < 2 ? null : (
        <ChartFrame
          heading={heading}
          note="Volts per group: line at the clips, dashes the rest voltage with its band, mark the target. Below, amps. The comb is when it will be ready."
          picture={
            <ChargePicture
              width={width}
              trace={option.trace}
              segments={option.segments}
              band={option.totalS}
              targetVolts={targetVolts}
              restBand={restBandOf(option.trace)}
              ticks={
                clipOnAt === null
                  ? spanTicks({ toS, width: fewer, stepS: spanStep(toS, fewer) })
                  : clockTicks({ zeroInstant: clipOnAt, fromS: 0, toS, width: fewer, zone, marks })
              }
              twin={`${heading}: the groups come to ${volts(targetVolts, marks)} at rest, ready ${at(option.totalS.p50)}, between ${at(option.totalS.p10)} and ${at(option.totalS.p90)}.`}
            />
          }
          table={<PictureTable trace={option.trace} at={at} />}
        />
      )}
    </View>
  );
}
