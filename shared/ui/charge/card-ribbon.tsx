import { useState } from 'react';
import { View } from 'react-native';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { clock as clockWords } from '../format/clock';
import { useFormats } from '../format/formats';
import { DockLane } from '../wait-ribbon/dock-lane';
import { clockTicks } from '../wait-ribbon/ticks';
import { TimeAxis } from '../wait-ribbon/time-axis';
import { ribbonTwin } from '../wait-ribbon/twin';
import { WaitRibbon } from '../wait-ribbon/wait-ribbon';
import { cardRibbon } from './card-drawings';
import type { CardClock } from './card-model';

/** A fill that is done in the wait for a charge. */
export interface RibbonDock {
  key: string;
  /** The charge that is waited for. */
  chargeId: string | null;
  /** Epoch ms. */
  from: number;
  to: number;
  title: string;
}

/** The ribbon of one charge, as wide as its place; on its own axis, or on one that rows share. */
export function CardRibbon({
  card,
  at,
  height = 56,
  axis = true,
  shared,
  nowMark = true,
  stale = false,
  docks = [],
}: {
  card: ChargeCardDto;
  at: CardClock;
  height?: number;
  /** Its own clock under it. */
  axis?: boolean;
  /** One axis for all rows, epoch ms; a ribbon that runs off it ends in two slanted strokes. */
  shared?: { from: number; to: number };
  nowMark?: boolean;
  stale?: boolean;
  /** Of these the ones in the wait for this charge stand under it. */
  docks?: readonly RibbonDock[];
}) {
  const { zone, marks } = useFormats();
  const [width, setWidth] = useState(0);
  const zero = Date.parse(card.startedAt ?? card.clipOnAt);
  const own = cardRibbon(card, at, zero);
  const ribbon = shared ? { ...own, fromS: (shared.from - zero) / 1000, toS: (shared.to - zero) / 1000 } : own;
  const words = (s: number) => clockWords(zero + s * 1000, zone, marks);
  const showsNow = nowMark && ribbon.showsNow;
  const seconds = (instant: number) => (instant - zero) / 1000;
  const fills = docks.filter(
    ({ chargeId, from, to }) => chargeId === card.id && seconds(to) > ribbon.fromS && seconds(from) < ribbon.toS,
  );
  return (
    <View
      onLayout={({ nativeEvent }) => setWidth(Math.round(nativeEvent.layout.width))}
      style={{ minHeight: height, overflow: shared ? 'hidden' : 'visible' }}
    >
      {width === 0 ? null : (
        <>
          <WaitRibbon
            {...ribbon}
            width={width}
            height={height}
            padTop={ribbon.lookIns.length > 0 ? 18 : 8}
            padBottom={showsNow ? 12 : 2}
            nowMark={showsNow}
            stale={stale}
            line={!shared}
            twin={ribbonTwin({ ...own, at: words })}
          />
          {fills.length > 0 ? (
            <DockLane
              label="Fills in this wait"
              fromS={ribbon.fromS}
              toS={ribbon.toS}
              width={width}
              docks={fills.map(({ key, from, to, title }) => ({
                key,
                kind: 'fill',
                fromS: seconds(from),
                toS: seconds(to),
                title,
                label: `${title}, ${clockWords(from, zone, marks)} to ${clockWords(to, zone, marks)}`,
              }))}
            />
          ) : null}
          {axis ? (
            <TimeAxis
              ticks={clockTicks({ zeroInstant: zero, fromS: own.fromS, toS: own.toS, width, zone, marks })}
              fromS={own.fromS}
              toS={own.toS}
              width={width}
            />
          ) : null}
        </>
      )}
    </View>
  );
}
