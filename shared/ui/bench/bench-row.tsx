import { Pressable, View } from 'react-native';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { CardColumn } from '../charge/card-column';
import { CardRibbon } from '../charge/card-ribbon';
import { isUnderWay, markOf, readyOf, titleAndChannel } from '../charge/card-model';
import { readyBounds, readyAt, moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { NBSP } from '../format/marks';
import { Duration } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { freshTone, StaleNote } from '../states/stale';
import { makeStyles } from '../theme/make-styles';
import { web } from '../theme/web-props';

/** Right of the tag: what comes next by the clock. */
function coming(card: ChargeCardDto, at: (instant: string) => string, now: number): string {
  if (card.stage === 'queued' || card.stage === 'planned') return `clip on at ${at(card.clipOnAt)}`;
  if (card.stage === 'held') return card.heldAt ? `held since ${at(card.heldAt)}` : '';
  if (card.stage === 'resting') return card.checkDueAt ? `check at ${at(card.checkDueAt)}` : '';
  if (card.stage === 'ready') return card.readyAt ? `since ${at(card.readyAt)}` : '';
  if (card.nextLookInAt === null) return '';
  return Date.parse(card.nextLookInAt) <= now ? 'look in now' : `look-in ${at(card.nextLookInAt)}`;
}

/**
 * One charge on the bench: tag, repair and channel, time left with its band, columns, ribbon. The whole row opens it.
 *
 * @param lead the first running one carries the screen's number
 */
export function BenchRow({
  card,
  now,
  lead = false,
  old = false,
  onOpen,
}: {
  card: ChargeCardDto;
  now: number;
  lead?: boolean;
  /** The link is down: figures turn grey. */
  old?: boolean;
  onOpen: () => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const at = (instant: string) => moment(Date.parse(instant), zone, now, marks);
  const ready = readyOf(card, now);
  const waits = card.stage === 'queued' || card.stage === 'planned';
  const leftS = ready ? (ready.p50 - (waits ? Date.parse(card.clipOnAt) : now)) / 1000 : null;
  const tone = freshTone(old);
  const band = ready;
  const bandWords = band ? readyAt(band, zone, now, marks) : null;
  return (
    <Pressable
      onPress={onOpen}
      role="link"
      style={styles.row}
      aria-label={`${card.title}, ${markOf(card)}, ${card.spare.label}`}
    >
      <View style={styles.head}>
        <View style={styles.tag}>
          <StageTag stage={markOf(card)} />
          <Txt tone="ink2" numberOfLines={1} style={styles.name}>
            {titleAndChannel(card)}
          </Txt>
        </View>
        <Txt kind="label" tone="ink2" nowrap style={styles.coming}>
          {coming(card, at, now)}
        </Txt>
      </View>
      <View style={styles.middle}>
        <View style={[styles.time, !lead && styles.inline]}>
          {card.stage === 'ready' ? (
            <Txt kind="numM">Ready, to be fitted</Txt>
          ) : leftS === null ? (
            <Txt tone="ink2">Not reckoned yet</Txt>
          ) : (
            <Duration
              seconds={Math.max(0, leftS)}
              precision={waits ? 'plan' : 'minute'}
              kind={lead ? 'hero' : 'numL'}
              tone={tone}
            />
          )}
          {band && card.stage !== 'ready' ? (
            <View>
              <Txt bold={lead} tone={tone} nowrap>{`ready${NBSP}${bandWords}`}</Txt>
              <Txt tone={old ? 'ink3' : 'ink2'} nowrap>{`(${readyBounds(band, zone, now, marks)})`}</Txt>
            </View>
          ) : null}
        </View>
        <CardColumn card={card} large={lead} />
      </View>
      {isUnderWay(card) ? <CardRibbon card={card} now={now} height={lead ? 56 : 34} axis={lead} stale={old} /> : null}
      {old && card.lastReadingAt ? <StaleNote since={at(card.lastReadingAt)} /> : null}
    </Pressable>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: { paddingTop: 14, paddingBottom: 14, borderBottomWidth: 1, borderBottomColor: colors.line, rowGap: 6 },
  head: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', columnGap: 12 },
  tag: { flexDirection: 'row', alignItems: 'center', columnGap: 10, flexShrink: 1, minWidth: 0 },
  name: { flexShrink: 1 },
  coming: { fontWeight: '400' },
  middle: { flexDirection: 'row', alignItems: 'flex-end', justifyContent: 'space-between', columnGap: 12 },
  time: { flexDirection: 'row', alignItems: 'flex-end', columnGap: 14, flexWrap: 'wrap', flexShrink: 1 },
  inline: { alignItems: 'center' },
}));
