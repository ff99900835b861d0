import { useState, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';

/** A chart with its heading (units stand there, not on each tick), its key and the way to the same as a table. */
export function ChartFrame({
  heading,
  legend,
  note,
  picture,
  table,
  onCsv,
}: {
  heading: string;
  legend?: ReactNode;
  /** How to read it, under the heading. */
  note?: string;
  picture: ReactNode;
  table: ReactNode;
  onCsv?: () => void;
}) {
  const [asTable, setAsTable] = useState(false);
  return (
    <View>
      <View style={styles.head}>
        <Txt kind="heading" heading={3} style={styles.words}>
          {heading}
        </Txt>
        {asTable ? null : legend}
        <Link
          kind="small"
          tight
          align="right"
          title={asTable ? 'as a picture' : 'as a table'}
          label={`${heading}, ${asTable ? 'as a picture' : 'as a table'}`}
          onPress={() => setAsTable(!asTable)}
        />
        {onCsv ? (
          <Link kind="small" tight align="right" title="CSV" label={`${heading}, as a CSV file`} onPress={onCsv} />
        ) : null}
      </View>
      {note && !asTable ? (
        <Txt kind="small" tone="ink2" style={styles.note}>
          {note}
        </Txt>
      ) : null}
      {asTable ? table : <View style={styles.picture}>{picture}</View>}
    </View>
  );
}

const styles = StyleSheet.create({
  head: { flexDirection: 'row', alignItems: 'center', columnGap: 16 },
  words: { flex: 1 },
  note: { marginTop: 2 },
  picture: { marginTop: 12 },
});
