import type { ReactNode } from 'react';
import { View } from 'react-native';
import { makeStyles } from '../theme/make-styles';
import { Txt } from './txt';

export interface Fact {
  name: string;
  /** A string gets the number face at the right. */
  value: ReactNode;
  /** Small and after the value: '±5 mV'. */
  note?: string;
}

/** Name left, value right, hairlines between: the facts beside a picture. */
export function FactList({ facts, tight = false }: { facts: readonly Fact[]; tight?: boolean }) {
  const styles = useStyles();
  return (
    <View role="list">
      {facts.map(({ name, value, note }, index) => (
        <View key={name} role="listitem" style={[styles.row, tight && styles.tight, index > 0 && styles.ruled]}>
          <Txt tone="ink2" style={styles.name}>
            {name}
          </Txt>
          <View style={styles.value}>
            {typeof value === 'string' ? (
              <Txt kind={tight ? 'numS' : 'numXS'} align="right">
                {value}
              </Txt>
            ) : (
              value
            )}
            {note ? <Txt tone="ink2">{note}</Txt> : null}
          </View>
        </View>
      ))}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: {
    flexDirection: 'row',
    alignItems: 'baseline',
    justifyContent: 'space-between',
    columnGap: 12,
    paddingVertical: 7,
  },
  tight: { paddingVertical: 1 },
  ruled: { borderTopWidth: 1, borderTopColor: colors.line },
  name: { flexShrink: 0 },
  value: { flexDirection: 'row', alignItems: 'baseline', columnGap: 5, flexShrink: 1 },
}));
