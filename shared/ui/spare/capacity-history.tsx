import { View } from 'react-native';
import type { SpareCapacityDto } from '@/shared/contract/spare';
import { date } from '../format/clock';
import { useFormats } from '../format/formats';
import { ampHours } from '../format/quantities';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

const stateWords: Readonly<Record<SpareCapacityDto['state'], string>> = {
  used: '',
  found: 'waits for an answer',
  left: 'left',
};

/** Every figure of the capacity that was typed or found, newest first, with one standard deviation. */
export function CapacityHistory({
  capacities,
  now,
  onOpenCharge,
}: {
  capacities: readonly SpareCapacityDto[];
  now: number;
  onOpenCharge: (id: string) => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  if (capacities.length === 0) return null;
  return (
    <View>
      <Txt kind="heading" heading={2} style={styles.head}>
        Capacity, told so far
      </Txt>
      <View role="list" aria-label="Capacity, told so far">
        {capacities.map(({ id, at, by, ampHours: likely, sdAh, source, state, chargeId }) => (
          <View role="listitem" key={id} style={styles.row}>
            <View style={styles.words}>
              <Txt numberOfLines={1}>{date(Date.parse(at), zone, now)}</Txt>
              <Txt kind="small" tone="ink2">
                {[
                  source === 'typed' ? 'typed' : 'read before and after a charge',
                  by.name.split(' ')[0],
                  stateWords[state],
                ]
                  .filter(Boolean)
                  .join(', ')}
              </Txt>
            </View>
            {chargeId ? (
              <Link
                kind="small"
                tight
                title="charge"
                label={`Open the charge of ${date(Date.parse(at), zone, now)}`}
                onPress={() => onOpenCharge(chargeId)}
              />
            ) : null}
            <Txt kind="numS" nowrap align="right" tone={state === 'left' ? 'ink3' : 'ink'}>
              {ampHours(likely, marks)}
            </Txt>
            <Txt kind="numS" nowrap align="right" tone="ink2" style={styles.sd}>{`±${ampHours(sdAh, marks)}`}</Txt>
          </View>
        ))}
      </View>
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  head: { marginBottom: 6 },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    minHeight: 48,
    paddingVertical: 4,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  words: { flex: 1, minWidth: 0 },
  sd: { minWidth: 64 },
}));
