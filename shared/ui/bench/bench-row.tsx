import { View } from 'react-native';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { CardColumn } from '../charge/card-column';
import { CardRibbon, type RibbonDock } from '../charge/card-ribbon';
import { isToCome, isUnderWay, markOf, stageWords, titleAndChannel, type CardClock } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { PressableLink } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { StaleNote } from '../states/stale';
import { makeStyles } from '../theme/make-styles';
import { BenchTime } from './bench-time';
import { coming } from './bench-words';

export interface BenchRowProps {
  card: ChargeCardDto;
  at: CardClock;
  lagLimitVolts?: number;
  /** The first running one carries the screen's number. */
  lead?: boolean;
  /** The link is down: figures turn grey. */
  old?: boolean;
  /** Fills of the one who looks, by the charge they wait for. */
  docks?: readonly RibbonDock[];
  onGo: (path: string) => void;
}

/** One charge on the bench: tag, repair and channel, time left with its band, columns, ribbon. The whole row opens it. */
export function BenchRow({ card, at, lagLimitVolts, lead = false, old = false, docks, onGo }: BenchRowProps) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const moments = (instant: string) => moment(Date.parse(instant), zone, at.now, marks);
  const live = `/charges/${card.id}`;
  const late = isToCome(card) && Date.parse(card.clipOnAt) <= at.now;
  return (
    <PressableLink
      href={live}
      onGo={() => onGo(live)}
      label={`${card.title}, ${card.overdueSince ? 'overdue' : stageWords(card)}, ${card.spare.label}`}
      style={({ pressed }) => [styles.row, pressed && styles.pressed]}
    >
      <View style={styles.head}>
        <View style={styles.tag}>
          <StageTag stage={markOf(card)} />
          <Txt tone="ink2" numberOfLines={1} style={styles.name}>
            {titleAndChannel(card)}
          </Txt>
        </View>
        <Txt kind="small" tone={late ? 'ink' : 'ink2'} bold={late} nowrap>
          {coming(card, moments, at.now)}
        </Txt>
      </View>
      <View style={styles.middle}>
        <BenchTime card={card} at={at} old={old} kind={lead ? 'hero' : 'numM'} stacked={lead} />
        <CardColumn card={card} lagLimitVolts={lagLimitVolts} large={lead} />
      </View>
      {isUnderWay(card) ? (
        <CardRibbon card={card} at={at} height={lead ? 70 : 48} axis={lead} stale={old} docks={docks} />
      ) : null}
      {old && card.lastReadingAt ? <StaleNote since={moments(card.lastReadingAt)} /> : null}
    </PressableLink>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: { paddingTop: 12, paddingBottom: 14, borderBottomWidth: 1, borderBottomColor: colors.line, rowGap: 6 },
  pressed: { backgroundColor: colors.well },
  head: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', columnGap: 12 },
  tag: { flexDirection: 'row', alignItems: 'center', columnGap: 12, flexShrink: 1, minWidth: 0 },
  name: { flexShrink: 1 },
  middle: { flexDirection: 'row', alignItems: 'flex-end', justifyContent: 'space-between', columnGap: 12 },
}));
