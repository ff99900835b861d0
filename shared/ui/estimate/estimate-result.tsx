import { View } from 'react-native';
import type { EstimateDto, EstimateInput, EstimateWayDto } from '@/shared/contract/estimate';
import { durationBand, duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { ampHours, clipVolts } from '../format/quantities';
import { LevelColumn } from '../level-column/level-column';
import { spanStep } from '../plan/span-step';
import { FullWidth } from '../primitives/full-width';
import { Duration } from '../primitives/num';
import { SegmentSwitch } from '../primitives/segment-switch';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { spanTicks } from '../wait-ribbon/ticks';
import { TimeAxis } from '../wait-ribbon/time-axis';
import { ribbonTwin } from '../wait-ribbon/twin';
import { WaitRibbon } from '../wait-ribbon/wait-ribbon';

export type QuickFinish = 'overAndSettle' | 'onTheMark';

const finishWords: Readonly<Record<QuickFinish, string>> = {
  overAndSettle: 'Over and settle',
  onTheMark: 'On the mark',
};

/** The finish to show: the one that was asked for, else the sooner; null where there is none. */
export function shownFinish(estimate: EstimateDto, wished: QuickFinish | null): QuickFinish | null {
  const there = (['overAndSettle', 'onTheMark'] as const).filter((finish) => estimate[finish] !== null);
  if (wished !== null && there.includes(wished)) return wished;
  const likely = (finish: QuickFinish) => estimate[finish]?.totalS.p50 ?? Number.POSITIVE_INFINITY;
  return [...there].sort((a, b) => likely(a) - likely(b))[0] ?? null;
}

/** Ready after: time, band, columns and ribbon. Both finishes stand on the same axis, so that switching compares them. */
export function EstimateResult({
  estimate,
  input,
  finish,
  old,
  onFinish,
}: {
  estimate: EstimateDto;
  input: EstimateInput;
  finish: QuickFinish;
  /** The numbers were changed and the next are being reckoned. */
  old: boolean;
  onFinish: (finish: QuickFinish) => void;
}) {
  const styles = useStyles();
  const { marks } = useFormats();
  const way = estimate[finish] as EstimateWayDto;
  const both = estimate.overAndSettle !== null && estimate.onTheMark !== null;
  const toS = 1.02 * Math.max(estimate.overAndSettle?.totalS.p90 ?? 0, estimate.onTheMark?.totalS.p90 ?? 0);
  const hanging = estimate.direction === 'discharge';
  const groups = Array.from({ length: input.groups }, () => ({ volts: input.spareVolts }));
  return (
    <View style={styles.stack} aria-busy={old}>
      {both ? (
        <SegmentSwitch
          label="Finish"
          value={finish}
          onChange={onFinish}
          segments={(['overAndSettle', 'onTheMark'] as const).map((value) => ({ value, label: finishWords[value] }))}
        />
      ) : (
        <Txt tone="ink2">{finishWords[finish]}</Txt>
      )}
      <View style={styles.head}>
        <View style={styles.words}>
          <Txt kind="small" tone="ink2">
            Ready after
          </Txt>
          <View style={styles.time}>
            <Duration seconds={way.totalS.p50} kind="hero" tone={old ? 'ink3' : 'ink'} />
            <Txt tone={old ? 'ink3' : 'ink2'} nowrap style={styles.band}>
              {durationBand(way.totalS)}
            </Txt>
          </View>
        </View>
        <LevelColumn
          place="list"
          size={input.groups > 4 ? { h: 70 } : { w: 18, gap: 5, h: 70, stroke: 2 }}
          stage={hanging ? 'discharging' : 'charging'}
          groups={groups}
          targetVolts={input.targetVolts}
          scale={{
            kind: 'window',
            lowVolts: Math.min(input.spareVolts, input.targetVolts) - 0.4,
            highVolts: Math.max(input.spareVolts, input.targetVolts) + 0.15,
          }}
          name="The spare"
          tab
        />
      </View>
      <FullWidth height={86}>
        {(width) => (
          <>
            <WaitRibbon
              segments={way.segments}
              band={way.totalS}
              fromS={0}
              toS={toS}
              width={width}
              height={66}
              padTop={10}
              hanging={hanging}
              twin={ribbonTwin({
                segments: way.segments,
                band: way.totalS,
                hanging,
                at: (s) => `${duration(s)} after clip-on`,
              })}
            />
            <TimeAxis
              ticks={spanTicks({ toS, width, stepS: spanStep(toS, width) })}
              fromS={0}
              toS={toS}
              width={width}
            />
          </>
        )}
      </FullWidth>
      <View style={styles.foot}>
        <Txt kind="small" tone="ink2" style={styles.words}>
          {`${ampHours(way.ampHours, marks)} ${hanging ? 'out of' : 'into'} a group, through the terminals${way.setVolts === null ? '' : `, charger set to ${clipVolts(way.setVolts, marks)}`}`}
        </Txt>
        <Txt kind="small" tone="ink2" nowrap>
          rest included
        </Txt>
      </View>
    </View>
  );
}

const useStyles = makeStyles(() => ({
  stack: { rowGap: 10 },
  head: { flexDirection: 'row', alignItems: 'flex-end', justifyContent: 'space-between', columnGap: 12 },
  words: { flexShrink: 1 },
  time: { flexDirection: 'row', alignItems: 'flex-end', flexWrap: 'wrap', columnGap: 14 },
  band: { paddingBottom: 6 },
  foot: { flexDirection: 'row', justifyContent: 'space-between', columnGap: 12 },
}));
