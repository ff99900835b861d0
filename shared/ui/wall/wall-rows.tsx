import { memo } from 'react';
import { StyleSheet, View } from 'react-native';
import { useFormats } from '../format/formats';
import { LevelColumn } from '../level-column/level-column';
import { makeStyles } from '../theme/make-styles';
import { OnSurface } from '../theme/surface';
import { wallScale } from '../theme/tokens';
import { clock } from '../format/clock';
import { clockTicks } from '../wait-ribbon/ticks';
import { WaitRibbon } from '../wait-ribbon/wait-ribbon';
import { StageBlock } from './stage-block';
import { columnOf, ribbonOf } from './wall-drawings';
import { markOf, rowWords, timeOf, whereAndWho, type WallCard, type WallClock } from './wall-model';
import { TimeOfRow, timeTones } from './wall-time';
import { TitleOfRow } from './wall-title';
import { WallText } from './wall-text';

/** The one axis of all rows: 2 h 12 before now to 4 h 48 after. */
const beforeS = 132 * 60;
const afterS = 288 * 60;
const axisHeight = 56;
/** Columns of a row, px: block, title, groups, and the gaps between them. */
const cols = { block: 252, title: 254, groups: 190, gap: 26, edge: 40, before: 20 } as const;
const ribbonLeft = cols.edge + cols.block + cols.gap + cols.title + cols.groups + cols.before;

export interface WallRowsProps {
  cards: readonly WallCard[];
  at: WallClock;
  /** Width of the stage; what is wider than 1920 goes to the ribbons. */
  width: number;
  dim: boolean;
}

/** Up to seven charges as rows on one axis, with one now line through all of them. */
export function WallRows({ cards, at, width, dim }: WallRowsProps) {
  const styles = useStyles();
  const low = cards.length > 6;
  const rowHeight = (low ? wallScale.seven : wallScale.upTo6).rowHeight;
  const ribbonWidth = 752 + (width - 1920);
  const nowX = ribbonLeft + (beforeS / (beforeS + afterS)) * ribbonWidth;
  return (
    <View style={styles.board}>
      <Axis at={at} width={ribbonWidth} nowX={nowX} dim={dim} />
      <View role="list" aria-label="Charges, most urgent first">
        {cards.map((card) => (
          <Row key={card.id} card={card} at={at} low={low} height={rowHeight} ribbonWidth={ribbonWidth} dim={dim} />
        ))}
      </View>
      <View style={[styles.now, { left: nowX - 2, height: cards.length * rowHeight + 4 }, dim && styles.dim]} />
    </View>
  );
}

function Axis({ at, width, nowX, dim }: { at: WallClock; width: number; nowX: number; dim: boolean }) {
  const styles = useStyles();
  const { marks } = useFormats();
  const ticks = clockTicks({
    zeroInstant: at.now,
    fromS: -beforeS,
    toS: afterS,
    width,
    zone: at.zone,
    stepS: 3600,
    marks,
  }).filter(({ s }) => Math.abs(s) >= 50 * 60 && s > -beforeS + 600 && s < afterS - 600);
  return (
    <View style={[styles.axis, dim && styles.dim]} aria-hidden>
      {ticks.map(({ s, text }) => (
        <View key={s} style={[styles.tick, { left: ribbonLeft + ((s + beforeS) / (beforeS + afterS)) * width - 60 }]}>
          <WallText size={32} tone="ink2">
            {text}
          </WallText>
        </View>
      ))}
      <View style={[styles.flag, { left: nowX - 46 }]}>
        <WallText size={34} line={44} strong tone="onInk">
          {at.stale ? clock(at.now, at.zone, marks) : 'now'}
        </WallText>
      </View>
      <View style={styles.ready}>
        <WallText size={32} tone="ink2">
          ready
        </WallText>
      </View>
    </View>
  );
}

const Row = memo(function Row({
  card,
  at,
  low,
  height,
  ribbonWidth,
  dim,
}: {
  card: WallCard;
  at: WallClock;
  low: boolean;
  height: number;
  ribbonWidth: number;
  dim: boolean;
}) {
  const styles = useStyles();
  const sizes = low ? wallScale.seven : wallScale.upTo6;
  const mark = markOf(card);
  const overdue = mark === 'overdue';
  const time = timeOf(card, at);
  const column = columnOf(card);
  const odd = column.groups.some((group) => group.odd);
  const six = column.groups.length > 4;
  const tones = timeTones(overdue, at.stale === true);
  return (
    <View
      role="listitem"
      aria-label={rowWords(card, time)}
      style={[styles.row, { height }, overdue && styles.overdue, dim && !overdue && styles.dim]}
    >
      <OnSurface tone={overdue ? 'alarmTint' : 'ground'}>
        <StageBlock
          mark={mark}
          size={{ width: cols.block, height: height - 2, glyph: sizes.glyph, word: sizes.stage, gap: low ? 5 : 8 }}
        />
        <View style={styles.title}>
          <TitleOfRow
            title={card.title}
            under={whereAndWho(card)}
            width={cols.title}
            size={sizes.repair}
            line={74}
            share={0.62}
            small={sizes.meta}
            smallLine={42}
          />
        </View>
        <View style={styles.groups}>
          <LevelColumn
            {...column}
            place="wall"
            size={{
              h: height - (odd ? 50 : 38),
              ...(column.groups.length > 8 ? {} : { w: six ? 18 : 34, gap: six ? 6 : 10 }),
            }}
            twin=""
          />
        </View>
        <View style={[styles.ribbon, { width: ribbonWidth }]}>
          <WaitRibbon
            {...ribbonOf(card, at, at.now)}
            fromS={-beforeS}
            toS={afterS}
            width={ribbonWidth}
            height={low ? 64 : 78}
            padTop={12}
            padBottom={4}
            slat={8}
            nowMark={false}
            twin=""
          />
        </View>
        <TimeOfRow time={time} size={sizes.time} line={low ? 86 : 96} small={sizes.meta} smallLine={38} {...tones} />
      </OnSurface>
    </View>
  );
});

const base = StyleSheet.create({ dim: { opacity: 0.5 } });
const useStyles = makeStyles(({ colors }) => ({
  board: { position: 'relative', flex: 1 },
  dim: StyleSheet.flatten(base.dim),
  axis: { height: axisHeight, position: 'relative' },
  tick: { position: 'absolute', top: 14, width: 120, alignItems: 'center' },
  flag: {
    position: 'absolute',
    top: 8,
    width: 92,
    height: 44,
    borderRadius: 3,
    alignItems: 'center',
    backgroundColor: colors.ink,
  },
  ready: { position: 'absolute', right: 40, top: 14 },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    paddingHorizontal: cols.edge,
    borderBottomWidth: 2,
    borderBottomColor: colors.line,
  },
  overdue: { backgroundColor: colors.alarmTint },
  title: { marginLeft: cols.gap, flexShrink: 0 },
  groups: { width: cols.groups, flexShrink: 0, alignItems: 'center' },
  // The silhouettes begin and end with the axis.
  ribbon: { marginLeft: cols.before, flexShrink: 0, overflow: 'hidden' },
  now: { position: 'absolute', top: 52, width: 4, backgroundColor: colors.ink },
}));
