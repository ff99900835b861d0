import { View } from 'react-native';
import type { PlanOption } from '@/calc/plan-types';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { NBSP } from '../format/marks';
import { ampHours, millivolts } from '../format/quantities';
import { RadioMark } from '../primitives/choice-row';
import { DurationWithBand } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { ribbonTwin } from '../wait-ribbon/twin';
import { WaitRibbon } from '../wait-ribbon/wait-ribbon';
import { finishOf, optionTitle, wayNames } from './way-words';

/** Letters that a way's name and its channel may have together on the first line of a phone. */
const firstLineLetters = 40;

/** What stands at the right of a way: it is too late, the soonest, or the soonest that leaves the busbars alone. */
function markWords(option: PlanOption, readyBy: string | null): { text: string; bad: boolean } | null {
  if (!option.withinTolerance) return { text: 'ends outside the tolerance', bad: true };
  if (option.tooLate) return { text: readyBy ? `too late for ${readyBy}` : 'too late', bad: true };
  if (option.soonest && option.soonestBusbarsStay) return { text: 'Soonest, busbars stay', bad: false };
  if (option.soonest) return { text: 'Soonest', bad: false };
  if (option.soonestBusbarsStay) return { text: 'Soonest, busbars stay', bad: false };
  return null;
}

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** The row in words, for readers. */
export function wayLabel(option: PlanOption, readyBy: string | null): string {
  const mark = markWords(option, readyBy);
  return [
    optionTitle(option),
    option.channelText,
    `${duration(option.totalS.p50)}, between ${duration(option.totalS.p10)} and ${duration(option.totalS.p90)}`,
    ...(mark ? [mark.text] : []),
  ].join(', ');
}

/** One way × finish × channel: time and band, ribbon on the axis all ways share, and what it needs in one line. */
export function WayRow({
  option,
  chosen,
  axisS,
  width,
  readyBy,
  wide,
}: {
  option: PlanOption;
  chosen: boolean;
  /** Length of the shared axis, s. Never rescaled for one row. */
  axisS: number;
  /** px of the row. */
  width: number;
  /** '18:15' */
  readyBy: string | null;
  wide: boolean;
}) {
  const styles = useStyles();
  const { marks } = useFormats();
  const mark = markWords(option, readyBy);
  // The first line of a phone bears so many letters; a longer one has its channel below.
  const below = wide || optionTitle(option).length + option.channelText.length > firstLineLetters;
  const needs = [
    ...(below ? [option.channelText.replace(' · ', ', ')] : []),
    option.busbarsOff ? 'busbars off' : 'busbars stay',
    `${duration(option.handsOnS, 'minute')} hands-on`,
    ampHours(option.ampHours, marks),
    `ends ${millivolts(option.endSpreadVolts)} apart`,
  ].join(' · ');
  const ribbonWidth = wide ? Math.round(width * 0.5) : width;
  const ribbon = (
    <WaitRibbon
      segments={option.segments}
      band={option.totalS}
      fromS={0}
      toS={axisS}
      width={ribbonWidth}
      height={wide ? 42 : 38}
      padTop={8}
      hanging={option.direction === 'discharge'}
      twin={ribbonTwin({
        segments: option.segments,
        band: option.totalS,
        hanging: option.direction === 'discharge',
        at: (s) => `${duration(s)} after clip-on`,
      })}
    />
  );
  const head = (
    <View style={styles.head}>
      <RadioMark on={chosen} />
      <Txt bold nowrap>
        {wayNames[option.way]}
      </Txt>
      {option.way === 'resistor' ? null : (
        <Txt tone="ink2" style={styles.finish} numberOfLines={1}>
          {finishOf(option)}
        </Txt>
      )}
      <View style={styles.grow} />
      {below ? null : (
        <Txt kind="label" nowrap>
          {option.channelText.replaceAll(' ', NBSP)}
        </Txt>
      )}
    </View>
  );
  const markText = mark ? (
    <Txt kind="label" tone={mark.bad ? 'alarm' : 'ink'} nowrap>
      {mark.text}
    </Txt>
  ) : null;
  return (
    <View style={styles.inside}>
      {wide ? (
        <View style={styles.beside}>
          <View style={styles.left}>
            {head}
            <DurationWithBand band={option.totalS} />
          </View>
          {ribbon}
        </View>
      ) : (
        <>
          {head}
          <View style={styles.time}>
            <DurationWithBand band={option.totalS} />
            {markText}
          </View>
          {ribbon}
        </>
      )}
      <View style={styles.time}>
        <Txt kind="small" tone="ink2" style={styles.needs}>
          {capital(needs)}
        </Txt>
        {wide ? markText : null}
      </View>
    </View>
  );
}

const useStyles = makeStyles(() => ({
  inside: { paddingVertical: 10, rowGap: 4, flex: 1 },
  head: { flexDirection: 'row', alignItems: 'center', columnGap: 10 },
  finish: { flexShrink: 1 },
  grow: { flex: 1 },
  time: { flexDirection: 'row', alignItems: 'baseline', justifyContent: 'space-between', columnGap: 12 },
  needs: { flexShrink: 1 },
  beside: { flexDirection: 'row', alignItems: 'flex-end', columnGap: 16 },
  left: { flex: 1, rowGap: 6 },
}));
