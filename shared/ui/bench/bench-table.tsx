import { useState } from 'react';
import { View } from 'react-native';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { CardColumn } from '../charge/card-column';
import { CardRibbon } from '../charge/card-ribbon';
import { channelsOf, firstName, markOf, readyOf, stageWords, type CardClock } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { PressableLink } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { makeStyles } from '../theme/make-styles';
import { clockTicks } from '../wait-ribbon/ticks';
import { TimeAxis } from '../wait-ribbon/time-axis';
import { BenchTime } from './bench-time';
import { coming } from './bench-words';
import type { BenchRowProps } from './bench-row';

const hour = 3_600_000;
/** The axis shows at least this much, and at most that much, around now. */
const least = { before: hour, after: 2 * hour } as const;
const most = { before: 3 * hour, after: 8 * hour } as const;

/** One axis for all rows, epoch ms: from the first begin to the last finish, within bounds; the rest runs off it. */
export function sharedAxis(cards: readonly ChargeCardDto[], at: CardClock): { from: number; to: number } {
  const begins = cards.map((card) => Date.parse(card.segments[0]?.from ?? card.clipOnAt));
  const ends = cards.map((card) => readyOf(card, at)?.p90 ?? at.now);
  const before = Math.min(most.before, Math.max(least.before, at.now - Math.min(at.now, ...begins)));
  const after = Math.min(most.after, Math.max(least.after, Math.max(at.now, ...ends) - at.now + hour / 12));
  return { from: at.now - before, to: at.now + after };
}

/** The running charges of the desk: rows on one shared axis, never rescaled. */
export function BenchTable({
  cards,
  at,
  ...row
}: Omit<BenchRowProps, 'card' | 'lead'> & { cards: readonly ChargeCardDto[] }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const [width, setWidth] = useState(0);
  const axis = sharedAxis(cards, at);
  const [fromS, toS] = [(axis.from - at.now) / 1000, (axis.to - at.now) / 1000];
  return (
    <View>
      <View style={styles.axisRow}>
        <View style={styles.left} />
        <View style={styles.ribbon} onLayout={({ nativeEvent }) => setWidth(Math.round(nativeEvent.layout.width))}>
          {width > 0 ? (
            <TimeAxis
              ticks={clockTicks({ zeroInstant: at.now, fromS, toS, width, zone, marks })}
              fromS={fromS}
              toS={toS}
              width={width}
            />
          ) : null}
        </View>
        <View style={styles.column} />
      </View>
      {cards.map((card, index) => (
        <TableRow key={card.id} {...row} card={card} at={at} lead={index === 0} axis={axis} />
      ))}
    </View>
  );
}

function TableRow({
  card,
  at,
  axis,
  lead,
  old = false,
  lagLimitVolts,
  docks,
  onGo,
}: BenchRowProps & { axis: { from: number; to: number } }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const live = `/charges/${card.id}`;
  const next = coming(card, (instant) => moment(Date.parse(instant), zone, at.now, marks), at.now);
  return (
    <PressableLink
      href={live}
      onGo={() => onGo(live)}
      label={`${card.title}, ${card.overdueSince ? 'overdue' : stageWords(card)}, ${card.spare.label}`}
      style={({ pressed }) => [styles.row, pressed && styles.pressed]}
    >
      <View style={styles.left}>
        <View style={styles.names}>
          <StageTag stage={markOf(card)} />
          <Txt bold numberOfLines={1} style={styles.title}>
            {card.title}
          </Txt>
        </View>
        <BenchTime card={card} at={at} old={old} kind={lead ? 'hero' : 'numM'} stacked={lead} />
        <Txt kind="small" tone="ink2" numberOfLines={1}>
          {[channelsOf(card), card.spare.label, card.person ? firstName(card.person.name) : '', next]
            .filter(Boolean)
            .join(' · ')}
        </Txt>
      </View>
      <View style={styles.ribbon}>
        <CardRibbon card={card} at={at} height={62} axis={false} shared={axis} stale={old} docks={docks} />
      </View>
      <View style={styles.column}>
        <CardColumn card={card} lagLimitVolts={lagLimitVolts} />
      </View>
    </PressableLink>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  axisRow: { flexDirection: 'row', columnGap: 20, paddingTop: 12 },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 20,
    paddingVertical: 10,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  pressed: { backgroundColor: colors.well },
  left: { width: 310, flexShrink: 0, rowGap: 2 },
  names: { flexDirection: 'row', alignItems: 'center', columnGap: 12, minHeight: 24 },
  title: { flexShrink: 1 },
  ribbon: { flex: 1, minWidth: 0 },
  column: { width: 96, alignItems: 'flex-end' },
}));
