import { useState } from 'react';
import { View } from 'react-native';
import type { PlanDto } from '@/shared/contract/plan';
import { clock, moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { ChoiceList } from '../primitives/choice-row';
import { Txt } from '../primitives/txt';
import { useBreakpoint } from '../theme/use-breakpoint';
import { clockTicks } from '../wait-ribbon/ticks';
import { TimeAxis } from '../wait-ribbon/time-axis';
import { finishNames, wayNames } from './way-words';
import { WayRow, wayLabel } from './way-row';

/** The shared axis ends a little behind the second-slowest sensible way, so that one slow way does not press the rest together. */
export function sharedAxisS(plan: PlanDto['plan']): number {
  const ends = plan.options.map((option) => option.totalS.p90).sort((a, b) => a - b);
  if (ends.length === 0) return 4 * 3600;
  const middle = ends[Math.min(ends.length - 1, Math.ceil(ends.length * 0.7))] ?? 4 * 3600;
  return Math.min(ends.at(-1) ?? middle, middle * 1.25) * 1.02;
}

/** All ways, soonest first, on one axis; what is ruled out stands under them with its reason. */
export function PlanWays({
  dto,
  chosen,
  readyBy,
  now,
  onChoose,
}: {
  dto: PlanDto;
  chosen: string | null;
  /** ISO instant wished for, or null. */
  readyBy: string | null;
  now: number;
  onChoose: (optionId: string) => void;
}) {
  const { zone, marks } = useFormats();
  const [width, setWidth] = useState(0);
  const wide = useBreakpoint() === 'wide';
  const { plan } = dto;
  const axisS = sharedAxisS(plan);
  const wished = readyBy === null ? null : moment(Date.parse(readyBy), zone, now, marks);
  const zero = Date.parse(dto.clipOnAt);
  const inner = Math.max(0, width - 4);
  const axisWidth = wide ? Math.round(inner * 0.5) : inner;
  return (
    <View>
      <View style={{ flexDirection: 'row', alignItems: 'baseline', justifyContent: 'space-between', columnGap: 12 }}>
        <Txt kind="heading" heading={2}>
          Ways, soonest first
        </Txt>
        <Txt kind="small" tone="ink2">{`from ${clock(zero, zone, marks)}, rest and check included`}</Txt>
      </View>
      <View onLayout={({ nativeEvent }) => setWidth(Math.round(nativeEvent.layout.width))}>
        {width === 0 ? null : (
          <>
            <ChoiceList
              label="Ways, soonest first"
              value={chosen}
              onChange={onChoose}
              outset={14}
              choices={plan.options.map((option) => ({
                value: option.id,
                title: wayLabel(option, wished),
                children: (
                  <WayRow
                    option={option}
                    chosen={option.id === chosen}
                    axisS={axisS}
                    width={inner}
                    readyBy={wished}
                    wide={wide}
                  />
                ),
              }))}
            />
            <View style={{ alignItems: 'flex-end' }}>
              <TimeAxis
                ticks={clockTicks({ zeroInstant: zero, fromS: 0, toS: axisS, width: axisWidth, zone, marks })}
                fromS={0}
                toS={axisS}
                width={axisWidth}
              />
            </View>
          </>
        )}
      </View>
      <RuledOut plan={plan} />
    </View>
  );
}

function RuledOut({ plan }: { plan: PlanDto['plan'] }) {
  if (plan.ruledOut.length === 0) return null;
  return (
    <View style={{ rowGap: 4, marginTop: 10 }}>
      {plan.ruledOut.map((way, index) => (
        <Txt key={`${way.way} ${way.finish} ${way.channelId ?? ''} ${index}`} kind="small" tone="ink2">
          <Txt kind="small" style={{ textDecorationLine: 'line-through' }}>
            {`${wayNames[way.way]}${way.way === 'resistor' ? '' : `, ${finishNames[way.finish]}`}${way.channelName ? `, ${way.channelName}` : ''}`}
          </Txt>
          {`: ${way.reason}`}
        </Txt>
      ))}
    </View>
  );
}
