import { StyleSheet, View } from 'react-native';
import { G, Path, Svg, Text as SvgText } from 'react-native-svg';
import type { BoardDto } from '@/shared/contract/board';
import { plannedAmps } from '../format/quantities';
import { clock } from '../format/clock';
import { useFormats } from '../format/formats';
import { useTheme } from '../theme/theme';
import { faceStacks } from '../theme/tokens';
import { freeWords } from './wall-model';
import { WallText } from './wall-text';

/** Vessels of this many channels are drawn; a larger workshop's others are counted in words. */
const mostVessels = 12;
const vesselHeight = 330;

/** No charges: what comes first, and the channels as empty vessels. */
export function WallEmpty({ board, width }: { board: BoardDto; width: number }) {
  const { zone, marks } = useFormats();
  const { next } = board;
  const first = next
    ? ` The first is ${next.title} at ${clock(Date.parse(next.clipOnAt), zone, marks)}${next.channelNames.length > 0 ? `, on ${next.channelNames.join(' and ')}` : ''}.`
    : '';
  return (
    <View style={styles.box}>
      <WallText size={118} strong heading={2}>
        No charges.
      </WallText>
      <WallText size={52} line={64} tone="ink2" style={styles.free}>
        {board.channels.length === 0 ? `No channels yet.${first}` : `${freeWords(board.channels.length)}${first}`}
      </WallText>
      <Vessels channels={board.channels.slice(0, mostVessels)} width={width - 80} />
    </View>
  );
}

function Vessels({ channels, width }: { channels: BoardDto['channels']; width: number }) {
  const { colors } = useTheme();
  if (channels.length === 0) return null;
  const pitch = Math.min(306, (width - 40) / channels.length);
  const w = Math.min(150, pitch * 0.49);
  const end = Math.min(width - 4, 40 + channels.length * pitch);
  const name = Math.min(80, pitch * 0.26);
  const amps = Math.min(40, pitch * 0.15);
  return (
    <View style={styles.vessels}>
      <Svg width={width} height={520} viewBox={`0 0 ${width} 520`} fill="none" aria-hidden>
        {channels.map((channel, i) => {
          const x = i * pitch + 40;
          const middle = x + w / 2;
          return (
            <G key={channel.id}>
              <Path d={`M${x} 0h${w}v${vesselHeight}h${-w}z`} fill={colors.well} />
              <Path d={`M${x} 0v${vesselHeight}h${w}v${-vesselHeight}`} stroke={colors.edge} strokeWidth={4} />
              <SvgText
                x={middle}
                y={vesselHeight + 92}
                textAnchor="middle"
                fill={colors.ink}
                fontFamily={faceStacks.num}
                fontWeight="600"
                fontSize={name}
              >
                {channel.name}
              </SvgText>
              <SvgText
                x={middle}
                y={vesselHeight + 142}
                textAnchor="middle"
                fill={colors.ink2}
                fontFamily={faceStacks.num}
                fontWeight="500"
                fontSize={amps}
              >
                {plannedAmps(channel.maxAmps)}
              </SvgText>
            </G>
          );
        })}
        <Path d={`M0 96H${end}`} stroke={colors.ground} strokeWidth={16} />
        <Path d={`M0 96H${end}`} stroke={colors.ink} strokeWidth={7} />
        <Path d={`M${end - 30} 96l30 -19v38z`} fill={colors.ink} />
      </Svg>
    </View>
  );
}

const styles = StyleSheet.create({
  box: { paddingTop: 84, paddingHorizontal: 40 },
  free: { marginTop: 12 },
  vessels: { marginTop: 80, overflow: 'visible' },
});
