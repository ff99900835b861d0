import { View } from 'react-native';
import type { StartNowDto } from '@/shared/contract/bench-plan';
import { duration, durationWithBand } from '../format/duration';
import { useFormats } from '../format/formats';
import { volts } from '../format/quantities';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { SideSection } from './side-section';

/** The address of Plan a charge with what a start now needs. */
export const startPath = (one: StartNowDto): string =>
  `/plan?${new URLSearchParams({ spare: one.spare.id, target: String(one.aimVolts), repair: one.number }).toString()}`;

/** Why it is brought there. */
const whereTo = (one: StartNowDto, usual: string): string =>
  one.aimVolts === one.usualVolts
    ? 'Packs of this type usually arrive there'
    : `No channel here takes it down again, and packs of this type arrive at ${usual} and below`;

/** Booked repairs whose spare could be brought close before the pack comes: what it takes, and what it saves. */
export function StartNowPart({ rows, onGo }: { rows: readonly StartNowDto[]; onGo: (path: string) => void }) {
  const styles = useStyles();
  const { marks } = useFormats();
  return (
    <SideSection title="Start it now" aside={`saves waits later`}>
      <View role="list" aria-label="Start it now" style={styles.list}>
        {rows.map((one) => {
          const path = startPath(one);
          const shelf = one.spare.shelfPlace === null ? '' : `, shelf ${one.spare.shelfPlace}`;
          const known =
            one.arrivals === 0
              ? 'typed for this pack type'
              : `from ${one.arrivals} ${one.arrivals === 1 ? 'arrival' : 'arrivals'}`;
          return (
            <View key={one.repairId} role="listitem" style={styles.row}>
              <View style={styles.words}>
                <Txt bold style={styles.title}>
                  {`${one.number}, ${one.vehicle}`}
                </Txt>
                <Txt kind="small">
                  {`Saves ${duration(one.savesS)} of wait: ${durationWithBand({ p10: one.takes.p10S, p50: one.takes.p50S, p90: one.takes.p90S })} now on ${one.channelName}, then ${duration(one.thenS)} once it is read.`}
                </Txt>
                <Txt kind="small" tone="ink2">
                  {`${one.spare.label}${shelf}, to ${volts(one.aimVolts, marks)}. ${whereTo(one, volts(one.usualVolts, marks))} (${known}).`}
                </Txt>
              </View>
              <Link
                title="Plan it"
                label={`Plan it: ${one.number}`}
                href={path}
                onPress={() => onGo(path)}
                align="right"
              />
            </View>
          );
        })}
      </View>
    </SideSection>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  list: { marginTop: 6 },
  row: {
    flexDirection: 'row',
    alignItems: 'flex-start',
    columnGap: 8,
    borderTopWidth: 1,
    borderTopColor: colors.line,
    paddingVertical: 8,
  },
  words: { flex: 1, minWidth: 0, rowGap: 2 },
  title: { fontSize: 15, lineHeight: 20 },
}));
