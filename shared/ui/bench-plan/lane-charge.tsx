import { Pressable, View } from 'react-native';
import type { Segment } from '@/calc/plan-types';
import { Circle, Path, Svg } from 'react-native-svg';
import { useFormats } from '../format/formats';
import { Txt } from '../primitives/txt';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { useTheme } from '../theme/theme';
import { radius, stroke, touch } from '../theme/tokens';
import { web, type WebKeyEvent } from '../theme/web-props';
import type { LookIn } from '../wait-ribbon/layout';
import { WaitRibbon } from '../wait-ribbon/wait-ribbon';
import type { CardClock } from '../charge/card-model';
import { pieceWords, type ChargeTag } from './charge-words';
import type { PlacedLabel } from './lane-labels';
import type { LanePiece } from './lane-pieces';
import { toX, type PlanAxis } from './plan-axis';
import type { LaneDrag, LanePointer } from './use-lane-drag';

export const rowHeight = 83;
/** The silhouette in its row, px. */
export const silhouette = { top: 29, height: 38, padTop: 8 } as const;

/** One charge in a lane: silhouette, name, look-ins, and the button over them. */
export function LaneCharge({
  piece,
  dots,
  channelName,
  axis,
  at,
  label,
  tag,
  pegs,
  picked,
  dim,
  drag,
  onPick,
  onKey,
}: {
  piece: LanePiece;
  /** It waits in the queue until then. */
  dots: Segment | null;
  channelName: string;
  axis: PlanAxis;
  at: CardClock;
  label: PlacedLabel;
  tag: ChargeTag | null;
  pegs: readonly LookIn[];
  picked: boolean;
  /** It is being moved, or the link is down. */
  dim: boolean;
  drag: LaneDrag;
  onPick: () => void;
  onKey: (event: WebKeyEvent) => void;
}) {
  const styles = useStyles();
  const formats = useFormats();
  const { ribbon, charge } = piece;
  // A little air, so that its frame does not stand on its name.
  const left = Math.max(0, Math.min(axis.width - touch.min, toX(axis, piece.from) - 5));
  const right = Math.max(left + touch.min, label.x + label.width, Math.min(axis.width, toX(axis, piece.to)));
  const movable = charge.fixedBecause === null;
  const pointer = movable
    ? {
        onPointerDown: (event: unknown) =>
          drag.begin(event as LanePointer, charge.card.id, Date.parse(charge.card.clipOnAt)),
        onPointerMove: (event: unknown) => drag.move(event as LanePointer),
        onPointerUp: drag.end,
        onPointerCancel: drag.cancel,
      }
    : {};
  return (
    <View role="listitem" style={styles.item}>
      <View style={[styles.ribbon, dim && styles.dim]} aria-hidden>
        <WaitRibbon
          segments={dots ? [dots, ...piece.segments] : piece.segments}
          fromS={0}
          toS={(axis.to - axis.from) / 1000}
          width={axis.width}
          height={silhouette.height}
          padTop={silhouette.padTop}
          nowS={ribbon.nowS}
          band={piece.band}
          hanging={ribbon.hanging}
          heldFromS={ribbon.heldFromS}
          stoppedAtS={ribbon.stoppedAtS}
          nowMark={false}
          line={false}
          twin=""
        />
      </View>
      <View style={[styles.label, { left: label.x }]} aria-hidden>
        <Txt kind="small" bold nowrap>
          {label.title}
        </Txt>
        {label.tag === null || tag === null ? null : (
          <Txt kind="small" nowrap bold={tag.tone !== 'plain'} tone={tag.tone === 'alarm' ? 'alarm' : 'ink2'}>
            {label.tag}
          </Txt>
        )}
      </View>
      {pegs.map((peg) => (
        <LookInHead key={peg.s} state={peg.state} x={(peg.s / ((axis.to - axis.from) / 1000)) * axis.width} top={9} />
      ))}
      <Pressable
        role="button"
        aria-label={pieceWords(piece, channelName, tag, at, axis.from, formats)}
        aria-pressed={picked}
        onPress={() => (drag.wasDrag() ? undefined : onPick())}
        {...web({ onKeyDown: onKey, dataSet: { charge: charge.card.id } })}
        {...pointer}
        style={[styles.target, { left, width: right - left }, movable && styles.movable, picked && styles.picked]}
      />
    </View>
  );
}

/** The head of a look-in: filled when it is done, larger when it is the next. */
export function LookInHead({
  x,
  top,
  state,
  missed = false,
  stem = false,
}: {
  x: number;
  top: number;
  state: LookIn['state'];
  /** Its time is over and nobody has looked in. */
  missed?: boolean;
  stem?: boolean;
}) {
  const { colors } = useTheme();
  const ink = missed ? colors.alarm : colors.ink;
  return (
    <View style={{ position: 'absolute', left: x - 7, top, pointerEvents: 'none', zIndex: 2 }} aria-hidden>
      <Svg width={14} height={16} viewBox="0 0 14 16" fill="none">
        {stem ? <Path d="M7 7V15" stroke={ink} strokeWidth={2} /> : null}
        <Circle
          cx={7}
          cy={7}
          r={state === 'next' ? 5.5 : 4.5}
          fill={state === 'done' ? ink : colors.ground}
          stroke={ink}
          strokeWidth={2}
        />
      </Svg>
    </View>
  );
}

const useStyles = makeStyles((theme) => ({
  // Of no layer of its own: the line of now passes between its silhouette and its name.
  item: { position: 'static', zIndex: 'auto' as unknown as number },
  ribbon: { position: 'absolute', left: 0, top: silhouette.top, pointerEvents: 'none' },
  dim: { opacity: 0.5 },
  label: {
    position: 'absolute',
    top: 6,
    flexDirection: 'row',
    columnGap: 8,
    pointerEvents: 'none',
    // Before the line of now, and cut free from it.
    zIndex: 2,
    backgroundColor: theme.colors.ground,
  },
  target: { position: 'absolute', top: 2, height: rowHeight - 4, borderRadius: radius.dock, zIndex: 3 },
  movable: { cursor: 'grab' } as object,
  picked: innerFrame(theme, stroke.chosen, theme.colors.ink),
}));
