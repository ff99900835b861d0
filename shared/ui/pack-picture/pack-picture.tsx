import { useState } from 'react';
import { Pressable, View } from 'react-native';
import { G, Path, Rect, Svg, Text as SvgText } from 'react-native-svg';
import { useFormats } from '../format/formats';
import { FullWidth } from '../primitives/full-width';
import { Txt } from '../primitives/txt';
import { useHalo } from '../theme/surface';
import { useTheme } from '../theme/theme';
import { faceStacks } from '../theme/tokens';
import { web } from '../theme/web-props';
import { GroupList } from './group-list';
import { layoutPack } from './layout';
import { fittingOddText, oddModules, oddText, packTwin, type OddModule } from './words';

export interface PackPictureProps {
  /** V, in the order of the pack's groups. */
  groupVolts: readonly number[];
  medianVolts: number;
  /** Odd groups, 0-based. */
  odd: readonly number[];
  /** Module position of each group. */
  positions: readonly string[];
  /** Against the median group, Ah; null where no curve is known. */
  groupAmpHours?: readonly number[] | null;
  /** Of the bars, px. */
  height?: number;
}

/** Room for the call-out above the bars, and for the group numbers under them, px. */
const [callHeight, tickHeight] = [30, 22];
/** From the called module to the first letter, px. */
const callLead = 24;

/**
 * The pack at a glance: a bar for each group from a broken foot, the median line with what good groups lie within, the
 * odd ones in alarm and named. A tap, Enter, or a reader's press opens the list of all groups.
 */
export function PackPicture({ height = 176, groupAmpHours = null, ...pack }: PackPictureProps) {
  const { groupVolts, medianVolts, odd, positions } = pack;
  const { marks } = useFormats();
  const [list, setList] = useState(false);
  const modules = oddModules(groupVolts, odd, positions, medianVolts);
  const [first, ...others] = modules;
  const named = others.slice(0, 3).map((one) => oddText(one, groupVolts, marks));
  const more = others.length - named.length;
  const total = height + tickHeight + (first ? callHeight : 0);
  return (
    <View style={{ rowGap: 6 }}>
      <Pressable
        role="button"
        aria-label={`${packTwin({ ...pack, marks })} List all groups.`}
        {...web({ dataSet: { press: '' } })}
        onPress={() => setList(true)}
      >
        <FullWidth height={total}>
          {(width) => <Drawing {...pack} width={width} height={height} worst={first ?? null} />}
        </FullWidth>
      </Pressable>
      {named.length > 0 ? (
        <Txt kind="small" tone="alarm" bold>
          {`${named.join('. ')}.${more > 0 ? ` And ${more} more modules.` : ''}`}
        </Txt>
      ) : null}
      <GroupList {...pack} groupAmpHours={groupAmpHours} open={list} onClose={() => setList(false)} />
    </View>
  );
}

function Drawing({
  width,
  height,
  worst,
  ...pack
}: Omit<PackPictureProps, 'groupAmpHours' | 'height'> & {
  width: number;
  height: number;
  /** The module that is called out. */
  worst: OddModule | null;
}) {
  const { marks } = useFormats();
  const { colors } = useTheme();
  const halo = useHalo();
  const drawn = layoutPack({ ...pack, worst: worst?.groups ?? [], width, height });
  const top = worst === null ? 0 : callHeight;
  const words = { fontFamily: faceStacks.text, fontSize: 14 };
  const right = drawn.callX !== null && drawn.callX > width / 2;
  const turn = right ? -1 : 1;
  const called = drawn.callX ?? 0;
  const room = (right ? called : width - called) - callLead;
  const call = worst && fittingOddText(worst, pack.groupVolts, pack.medianVolts, room, marks);
  return (
    <Svg
      width={width}
      height={top + height + tickHeight}
      viewBox={`0 ${-top} ${width} ${top + height + tickHeight}`}
      fill="none"
      aria-hidden
    >
      <Rect x={0} y={drawn.strip.y} width={width} height={drawn.strip.height} fill={colors.well} />
      <Path d={drawn.healthy} fill={colors.ink3} />
      <Path d={drawn.odd} fill={colors.alarm} />
      <Path d={`M0 ${drawn.medianY}H${width}`} stroke={halo} strokeWidth={4} />
      <Path d={`M0 ${drawn.medianY}H${width}`} stroke={colors.ink} strokeWidth={2} />
      {drawn.breakY === null ? null : <Path d={`M-2 ${drawn.breakY}H${width + 2}`} stroke={halo} strokeWidth={4} />}
      {call === null || drawn.callX === null ? null : (
        <G>
          <Path d={`M${drawn.callX} -2V-20H${drawn.callX + turn * 18}`} stroke={colors.alarm} strokeWidth={2} />
          <SvgText
            x={drawn.callX + turn * callLead}
            y={-15}
            textAnchor={right ? 'end' : 'start'}
            fill={colors.alarm}
            fontWeight="600"
            {...words}
          >
            {call}
          </SvgText>
        </G>
      )}
      {drawn.ticks.map(({ x, text, anchor }) => (
        <SvgText key={text} x={x} y={height + 17} textAnchor={anchor} fill={colors.ink2} {...words}>
          {text}
        </SvgText>
      ))}
    </Svg>
  );
}
