import { memo } from 'react';
import { StyleSheet, View } from 'react-native';
import { useFormats } from '../format/formats';
import { LevelColumn } from '../level-column/level-column';
import { makeStyles } from '../theme/make-styles';
import { OnSurface } from '../theme/surface';
import { wallScale } from '../theme/tokens';
import { WaitRibbon } from '../wait-ribbon/wait-ribbon';
import { StageBlock } from './stage-block';
import { columnOf, ownAxis, ribbonOf } from './wall-drawings';
import { markOf, moreWords, mostCells, rowWords, timeOf, whereAndWho, type WallCard } from './wall-model';
import type { WallRowsProps } from './wall-rows';
import { TimeOfRow, timeTones } from './wall-time';
import { TitleOfRow } from './wall-title';
import { WallText } from './wall-text';

const sizes = wallScale.upTo14;
const perColumn = 7;
/** Lower rows leave room for the line about the others. */
const rowHeightWithMore = 132;

/** Eight to fourteen charges in two columns, each ribbon on its own axis; of more the fourteen soonest and how many follow. */
export function WallCells({ cards, at, width, dim }: WallRowsProps) {
  const styles = useStyles();
  const { marks } = useFormats();
  const shown = cards.slice(0, mostCells);
  const hidden = cards.slice(mostCells);
  const height = hidden.length > 0 ? rowHeightWithMore : sizes.rowHeight;
  const cell = (card: WallCard) => (
    <Cell key={card.id} card={card} at={at} height={height} ribbonWidth={170 + (width - 1920) / 2} dim={dim} />
  );
  return (
    <View style={styles.board}>
      <View role="list" aria-label="Charges, most urgent first" style={styles.columns}>
        <View style={styles.column}>{shown.slice(0, perColumn).map(cell)}</View>
        <View style={styles.column}>{shown.slice(perColumn).map(cell)}</View>
      </View>
      {hidden.length > 0 ? (
        <View style={[styles.more, dim && styles.dim]}>
          <WallText size={40} tone="ink2">
            {moreWords(hidden, at.zone, marks)}
          </WallText>
        </View>
      ) : null}
    </View>
  );
}

const Cell = memo(function Cell({
  card,
  at,
  height,
  ribbonWidth,
  dim,
}: {
  card: WallCard;
  at: WallRowsProps['at'];
  height: number;
  ribbonWidth: number;
  dim: boolean;
}) {
  const styles = useStyles();
  const mark = markOf(card);
  const overdue = mark === 'overdue';
  const time = timeOf(card, at);
  const column = columnOf(card);
  const count = column.groups.length;
  const odd = column.groups.some((group) => group.odd);
  const ribbon = ribbonOf(card, at, at.now);
  const word = time.large.length > 2 && /[a-z]/.test(time.large);
  return (
    <View
      role="listitem"
      aria-label={rowWords(card, time)}
      style={[styles.cell, { height }, overdue && styles.overdue, dim && !overdue && styles.dim]}
    >
      <OnSurface tone={overdue ? 'alarmTint' : 'ground'}>
        <StageBlock
          mark={mark}
          size={{ width: 164, height: height - 2, glyph: sizes.glyph, word: sizes.stage, gap: 8 }}
        />
        <View style={styles.title}>
          <TitleOfRow
            title={card.title}
            under={whereAndWho(card)}
            width={178}
            size={sizes.repair}
            line={62}
            share={0.6}
            small={sizes.meta}
            smallLine={36}
          />
        </View>
        <View style={styles.groups}>
          <LevelColumn
            {...column}
            place="wall"
            size={{
              h: (odd ? 84 : 96) - (sizes.rowHeight - height),
              stroke: 2,
              ...(count > 8 ? { w: 4, gap: 2 } : { w: count > 4 ? 11 : count > 2 ? 16 : 26, gap: count > 4 ? 4 : 6 }),
            }}
            twin=""
          />
        </View>
        <View style={styles.ribbon}>
          <WaitRibbon
            {...ribbon}
            {...ownAxis(ribbon)}
            width={ribbonWidth}
            height={54}
            padTop={10}
            padBottom={12}
            slat={6}
            stale={at.stale}
            twin=""
          />
        </View>
        <TimeOfRow
          time={time}
          size={word ? 76 : sizes.time}
          line={80}
          small={sizes.meta}
          smallLine={33}
          {...timeTones(overdue, at.stale === true)}
        />
      </OnSurface>
    </View>
  );
});

const base = StyleSheet.create({ dim: { opacity: 0.5 } });
const useStyles = makeStyles(({ colors }) => ({
  board: { flex: 1 },
  dim: StyleSheet.flatten(base.dim),
  columns: { flexDirection: 'row', columnGap: 40, paddingTop: 6, paddingHorizontal: 40 },
  column: { flexGrow: 1, flexShrink: 1, flexBasis: 0 },
  cell: {
    flexDirection: 'row',
    alignItems: 'center',
    paddingRight: 10,
    borderBottomWidth: 2,
    borderBottomColor: colors.line,
  },
  overdue: { backgroundColor: colors.alarmTint },
  title: { marginLeft: 16, flexShrink: 0 },
  groups: { width: 120, flexShrink: 0, alignItems: 'center' },
  ribbon: { marginLeft: 12, flexShrink: 0 },
  more: { paddingHorizontal: 40, height: 56, justifyContent: 'center' },
}));
