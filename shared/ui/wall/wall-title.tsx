import { View } from 'react-native';
import { splitTitle } from './wall-model';
import { WallPart, WallText } from './wall-text';

/** Mean advance of the face at weight 600, em: long titles are set smaller instead of running out of their column. */
const advance = 0.47;

/** Repair (or number of the charge) and under it channel and person. */
export function TitleOfRow({
  title,
  under,
  width,
  size,
  line,
  share,
  small,
  smallLine,
}: {
  title: string;
  under: string;
  width: number;
  size: number;
  line: number;
  /** Size of the letters before the number, as a share. */
  share: number;
  small: number;
  smallLine: number;
}) {
  const { prefix, rest } = splitTitle(title);
  const ems = (prefix.length * share + rest.length) * advance;
  const fitted = Math.min(size, Math.floor((width - 4) / ems));
  return (
    <View style={{ width, flexShrink: 0, overflow: 'hidden' }}>
      <WallText size={fitted} line={line} strong>
        {prefix ? (
          <WallPart share={share} size={fitted} tone="ink2">
            {prefix}
          </WallPart>
        ) : null}
        {rest}
      </WallText>
      <WallText size={small} line={smallLine} tone="ink2" style={{ marginTop: Math.round(size * 0.14) }}>
        {under}
      </WallText>
    </View>
  );
}
