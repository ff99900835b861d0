import { View } from 'react-native';
import type { AlertDto } from '@/shared/contract/alert';
import { Txt } from '../primitives/txt';
import { Columns } from '../screen/columns';
import { makeStyles } from '../theme/make-styles';
import { AlertCard } from './alert-card';
import { AlertRow } from './alert-row';
import type { ComponentProps, ReactNode } from 'react';

type CardProps = ComponentProps<typeof AlertCard>;

/** Open alerts as they come from the server (the most urgent on top), and what was settled in the last day. */
export function AlertLists({
  alerts,
  now,
  cardOf,
  onGo,
  above,
  below,
}: {
  alerts: readonly AlertDto[];
  now: number;
  /** What a card shows and does beside its alert. */
  cardOf: (alert: AlertDto) => Omit<CardProps, 'alert' | 'now' | 'onGo'>;
  onGo: (path: string) => void;
  /** Before the open ones: what could not be brought to somebody. */
  above?: ReactNode;
  /** Under the settled ones. */
  below?: ReactNode;
}) {
  const styles = useStyles();
  const open = alerts.filter((alert) => alert.clearedAt === null);
  const settled = alerts.filter((alert) => alert.clearedAt !== null);
  return (
    <Columns
      work={
        <View style={styles.stack}>
          {above}
          {open.length === 0 ? (
            <Txt kind="titleWide" style={styles.none}>
              No open alerts.
            </Txt>
          ) : null}
          {open.map((alert) => (
            <AlertCard key={alert.id} alert={alert} now={now} onGo={onGo} {...cardOf(alert)} />
          ))}
        </View>
      }
      side={
        <View>
          <Txt kind="label" tone="ink2" heading={2} style={styles.heading}>
            Settled in the last 24 hours
          </Txt>
          {settled.length === 0 ? (
            <Txt kind="small" tone="ink2">
              None.
            </Txt>
          ) : (
            settled.map((alert) => <AlertRow key={alert.id} alert={alert} now={now} onGo={onGo} />)
          )}
          {below}
        </View>
      }
    />
  );
}

const useStyles = makeStyles(() => ({
  stack: { rowGap: 10 },
  none: { paddingVertical: 24 },
  heading: { marginBottom: 6 },
}));
