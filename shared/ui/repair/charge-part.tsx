import { View } from 'react-native';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { BenchTime } from '../bench/bench-time';
import { coming } from '../bench/bench-words';
import { CardColumn } from '../charge/card-column';
import { CardRibbon } from '../charge/card-ribbon';
import { channelsOf, markOf, stageWords, type CardClock } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';

/** The open charge of a repair: stage, time with its band, levels and ribbon, and the way to its own page. */
export function ChargePart({
  card,
  at,
  old = false,
  onOpen,
}: {
  card: ChargeCardDto;
  at: CardClock;
  /** The link is down: figures turn grey. */
  old?: boolean;
  onOpen: (path: string) => void;
}) {
  const { zone, marks } = useFormats();
  const where = channelsOf(card);
  const next = coming(card, (instant) => moment(Date.parse(instant), zone, at.now, marks), at.now);
  const path = `/charges/${card.id}`;
  return (
    <View role="region" aria-label="The charge" style={{ rowGap: 6 }}>
      <View style={{ flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', columnGap: 12 }}>
        <StageTag
          stage={markOf(card)}
          text={`${card.overdueSince ? 'Overdue' : stageWords(card)}${where ? ` on ${where}` : ''}`}
        />
        <Txt kind="small" tone="ink2" align="right" style={{ flexShrink: 1 }}>
          {next}
        </Txt>
      </View>
      <View style={{ flexDirection: 'row', alignItems: 'flex-end', justifyContent: 'space-between', columnGap: 12 }}>
        <BenchTime card={card} at={at} kind="numL" old={old} stacked />
        <CardColumn card={card} />
      </View>
      <CardRibbon card={card} at={at} height={70} stale={old} />
      <Link
        href={path}
        onPress={() => onOpen(path)}
        title={`${card.number}, spare ${card.spare.label}`}
        label={`Open the charge ${card.number}`}
      />
    </View>
  );
}
