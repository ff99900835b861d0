import { View } from 'react-native';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { benchOrder, isUnderWay } from '../charge/card-model';
import { Columns } from '../screen/columns';
import { Txt } from '../primitives/txt';
import { BenchCallOut } from './bench-call-out';
import { BenchRow } from './bench-row';

const needsSomebody = (card: ChargeCardDto) =>
  card.overdueSince !== null || card.stage === 'check-due' || card.nextHand !== null;

/** At most two call-outs on a screen; what else waits stands as a row, in its place of the order. */
const mostCallOuts = 2;

/** All open charges: what needs somebody first, then what runs, then what is to come. */
export function BenchList({
  charges,
  now,
  old,
  onGo,
}: {
  charges: readonly ChargeCardDto[];
  now: number;
  old: boolean;
  onGo: (path: string) => void;
}) {
  const ordered = benchOrder(charges, now);
  const calls = ordered.filter(needsSomebody).slice(0, mostCallOuts);
  const rest = ordered.filter((card) => !calls.includes(card));
  const running = rest.filter((card) => isUnderWay(card));
  const later = rest.filter((card) => !isUnderWay(card));
  const row = (card: ChargeCardDto, lead = false) => (
    <BenchRow key={card.id} card={card} now={now} lead={lead} old={old} onOpen={() => onGo(`/charges/${card.id}`)} />
  );
  return (
    <Columns
      work={
        <View>
          <View style={{ rowGap: 12 }}>
            {calls.map((card) => (
              <BenchCallOut key={card.id} card={card} now={now} onGo={onGo} />
            ))}
          </View>
          {running.map((card, index) => row(card, index === 0))}
        </View>
      }
      side={
        later.length === 0 ? undefined : (
          <View>
            <Txt kind="heading" heading={2}>
              To come, and ready
            </Txt>
            {later.map((card) => row(card))}
          </View>
        )
      }
    />
  );
}
