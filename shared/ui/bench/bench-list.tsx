import type { ReactNode } from 'react';
import { View } from 'react-native';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { benchOrder, isUnderWay, type CardClock } from '../charge/card-model';
import { Columns } from '../screen/columns';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { useBreakpoint } from '../theme/use-breakpoint';
import type { RibbonDock } from '../charge/card-ribbon';
import { BenchCallOut } from './bench-call-out';
import { BenchRow } from './bench-row';
import { BenchTable } from './bench-table';

const needsSomebody = (card: ChargeCardDto) =>
  card.overdueSince !== null || card.stage === 'check-due' || card.nextHand !== null;

/** At most two call-outs on a screen; what else waits stands as a row, in its place of the order. */
const mostCallOuts = 2;

/** All open charges: what needs somebody first, then what runs, then what is to come, and what is ready to be fitted. */
export function BenchList({
  charges,
  at,
  lagLimitVolts,
  old,
  docks,
  next,
  foot,
  onGo,
}: {
  charges: readonly ChargeCardDto[];
  at: CardClock;
  lagLimitVolts?: number;
  old: boolean;
  /** Fills that dock under the ribbons of the charges they wait for. */
  docks?: readonly RibbonDock[];
  /** After what needs somebody: the own work that is to be done now. */
  next?: ReactNode;
  /** After what is to come: what fits the own wait. */
  foot?: ReactNode;
  onGo: (path: string) => void;
}) {
  const styles = useStyles();
  const wide = useBreakpoint() === 'wide';
  const common = { at, lagLimitVolts, old, docks, onGo };
  const ordered = benchOrder(charges, at);
  const calls = ordered.filter(needsSomebody).slice(0, mostCallOuts);
  const rest = ordered.filter((card) => !calls.includes(card));
  const running = rest.filter((card) => isUnderWay(card));
  const later = rest.filter((card) => !isUnderWay(card));
  return (
    <Columns
      work={
        <View>
          <View style={wide ? styles.beside : styles.under}>
            {calls.map((card) => (
              <BenchCallOut key={card.id} card={card} at={at} lagLimitVolts={lagLimitVolts} beside={wide} onGo={onGo} />
            ))}
          </View>
          {next}
          {wide && running.length > 0 ? (
            <BenchTable cards={running} {...common} />
          ) : (
            running.map((card, index) => <BenchRow key={card.id} card={card} lead={index === 0} {...common} />)
          )}
          {wide && running.length === 0 && calls.length === 0 ? (
            <Txt tone="ink2" style={styles.none}>
              Nothing runs now.
            </Txt>
          ) : null}
        </View>
      }
      side={
        later.length === 0 && !foot ? undefined : (
          <View>
            {wide && later.length > 0 ? (
              <Txt kind="heading" heading={2}>
                {headingOf(later)}
              </Txt>
            ) : null}
            {later.map((card) => (
              <BenchRow key={card.id} card={card} {...common} />
            ))}
            {foot}
          </View>
        )
      }
    />
  );
}

function headingOf(cards: readonly ChargeCardDto[]): string {
  const ready = cards.some((card) => card.stage === 'ready');
  const toCome = cards.some((card) => card.stage !== 'ready');
  return ready && toCome ? 'To come, and ready' : ready ? 'Ready to be fitted' : 'To come';
}

const useStyles = makeStyles(() => ({
  beside: { flexDirection: 'row', columnGap: 16, alignItems: 'stretch' },
  under: { rowGap: 12 },
  none: { paddingVertical: 24 },
}));
