import { useState } from 'react';
import { View } from 'react-native';
import type { PlanOption, RuledOutWay } from '@/calc/plan-types';
import type { PlanDto } from '@/shared/contract/plan';
import { clock, moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Button } from '../primitives/button';
import { ChoiceList } from '../primitives/choice-row';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { useBreakpoint } from '../theme/use-breakpoint';
import { clockTicks } from '../wait-ribbon/ticks';
import { TimeAxis } from '../wait-ribbon/time-axis';
import { finishNames, wayNames } from './way-words';
import { WayRow, wayLabel } from './way-row';

/** So many of the soonest decide how long the shared axis is; a way that is much slower runs off it. */
const comparedWays = 5;

/** Length of the axis that all ways share, s. */
export function sharedAxisS(plan: PlanDto['plan']): number {
  const ends = plan.options.slice(0, comparedWays).map((option) => option.totalS.p90);
  return ends.length === 0 ? 4 * 3600 : Math.max(...ends) * 1.04;
}

/** The first ways with those that carry a mark and the chosen one: what a decision needs. The order stays. */
export function shownOptions(options: readonly PlanOption[], most: number, chosen: string | null): PlanOption[] {
  if (options.length <= most + 1) return [...options];
  return options.filter(
    (option, index) => index < most || option.id === chosen || option.soonest || option.soonestBusbarsStay,
  );
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
  const [all, setAll] = useState(false);
  const shown = all ? plan.options : shownOptions(plan.options, wide ? 5 : 3, chosen);
  const hidden = plan.options.length - shown.length;
  return (
    <View>
      <View style={{ flexDirection: 'row', alignItems: 'baseline', justifyContent: 'space-between', columnGap: 12 }}>
        <Txt kind="heading" heading={2}>
          Ways, soonest first
        </Txt>
        <Txt kind="small" tone="ink2" nowrap>
          {wide
            ? `all from ${clock(zero, zone, marks)}, rest and check included`
            : `from ${clock(zero, zone, marks)}, ${shown.length} of ${plan.options.length}`}
        </Txt>
      </View>
      <View onLayout={({ nativeEvent }) => setWidth(Math.round(nativeEvent.layout.width))}>
        {width === 0 ? null : (
          <>
            <ChoiceList
              label="Ways, soonest first"
              value={chosen}
              onChange={onChoose}
              outset={14}
              choices={shown.map((option) => ({
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
      {hidden > 0 ? (
        <Button
          look="line"
          size="small"
          style={{ marginTop: 8 }}
          title={hidden === 1 ? '1 more way' : `${hidden} more ways`}
          onPress={() => setAll(true)}
        />
      ) : null}
      <RuledOut plan={plan} />
      {wide ? null : (
        <Txt kind="small" tone="ink2" style={{ marginTop: 10 }}>
          All times include rest and check.
        </Txt>
      )}
    </View>
  );
}

/** What is ruled out, with its reason; ways that share a reason stand together. */
function RuledOut({ plan }: { plan: PlanDto['plan'] }) {
  const [open, setOpen] = useState(false);
  const reasons = [...new Set(plan.ruledOut.map(({ reason }) => reason))];
  if (reasons.length === 0) return null;
  const shown = open || reasons.length <= 3 ? reasons : reasons.slice(0, 2);
  return (
    <View style={{ rowGap: 6, marginTop: 12 }}>
      {shown.map((reason) => (
        <Txt key={reason} kind="small" tone="ink2">
          <Txt kind="small" tone="ink2" style={{ textDecorationLine: 'line-through' }}>
            {ruledOutWays(plan.ruledOut.filter((way) => way.reason === reason))}
          </Txt>
          {`  ${reason}`}
        </Txt>
      ))}
      {shown.length < reasons.length ? (
        <Link
          kind="small"
          tight
          title={`${reasons.length - shown.length} more that are ruled out`}
          onPress={() => setOpen(true)}
        />
      ) : null}
    </View>
  );
}

/** 'Terminals, on the mark, A1, A2' */
export function ruledOutWays(ways: readonly RuledOutWay[]): string {
  const parts = new Map<string, Set<string>>();
  for (const { way, finish, channelName } of ways) {
    const name = way === 'resistor' ? wayNames.resistor : `${wayNames[way]}, ${finishNames[finish]}`;
    const channels = parts.get(name) ?? new Set();
    if (channelName) channels.add(channelName);
    parts.set(name, channels);
  }
  return [...parts].map(([name, channels]) => [name, ...channels].join(', ')).join('; ');
}
