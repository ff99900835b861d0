import { useState } from 'react';
import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { ChargePicture } from '../charts/charge-picture';
import { ChartFrame } from '../charts/chart-frame';
import { restBandOf } from '../charts/picture-rows';
import { PictureTable } from '../charts/picture-table';
import { clock } from '../format/clock';
import { useFormats } from '../format/formats';
import { volts } from '../format/quantities';
import { clockTicks } from '../wait-ribbon/ticks';
import { cardRibbon } from './card-drawings';
import { isOddReading } from './odd-seen-words';
import { movedMs, type CardClock } from './card-model';

/**
 * The plan's trace on the clock of the picture. A stored option counts from the clip-on, a running charge from its first
 * current; one that waits moves with the clock.
 */
function tracedFrom(charge: ChargeDto, at: CardClock) {
  const { trace, currentStartS } = charge.option;
  const shift = charge.startedAt === null ? movedMs(charge, at) / 1000 : -currentStartS;
  return trace.map((point) => ({ ...point, s: point.s + shift })).filter((point) => point.s >= 0);
}

/** Volts and amps of the plan with the readings on it. Loaded after the screen, since it brings the charts. */
export function LivePicture({ charge, at }: { charge: ChargeDto; at: CardClock }) {
  const { zone, marks } = useFormats();
  const [width, setWidth] = useState(0);
  const zero = Date.parse(charge.startedAt ?? charge.clipOnAt);
  const ribbon = cardRibbon(charge, at, zero);
  const trace = tracedFrom(charge, at);
  const toS = Math.max(trace.at(-1)?.s ?? 0, ribbon.toS);
  const count = Math.max(1, charge.groups.length);
  const readings = charge.readings
    .filter((reading) => reading.replacedBy === null)
    .map((reading) => ({
      s: (Date.parse(reading.at) - zero) / 1000,
      volts: reading.terminalVolts === null || charge.way !== 'terminals' ? null : reading.terminalVolts / count,
      amps: reading.amps === null ? null : Math.abs(reading.amps),
      odd: isOddReading(reading, charge.odd),
    }));
  return (
    <View onLayout={({ nativeEvent }) => setWidth(Math.round(nativeEvent.layout.width))}>
      {width === 0 || trace.length < 2 ? null : (
        <ChartFrame
          heading="The picture"
          note="Volts per group: line at the clips, dashes the rest voltage with its band, mark the target; dots are readings, octagons odd ones. Below, amps, and the comb of the finish."
          picture={
            <ChargePicture
              width={width}
              trace={trace}
              segments={ribbon.segments}
              band={ribbon.band ?? charge.option.totalS}
              targetVolts={charge.targetVolts}
              restBand={restBandOf(trace)}
              readings={readings}
              ticks={clockTicks({ zeroInstant: zero, fromS: 0, toS, width, zone, marks })}
              twin={`By the plan the groups reach ${volts(charge.targetVolts, marks)} at rest; current flows until ${clock(zero + (ribbon.segments.findLast((segment) => segment.kind === 'cc' || segment.kind === 'taper')?.toS ?? 0) * 1000, zone, marks)}.`}
            />
          }
          table={<PictureTable trace={trace} readings={readings} at={(s) => clock(zero + s * 1000, zone, marks)} />}
        />
      )}
    </View>
  );
}
