import type { ReactNode } from 'react';
import { View } from 'react-native';
import type { WaitsTodayDto } from '@/shared/contract/bench-plan';
import { Duration, Num } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { SideSection } from './side-section';

/** Share of the waits in which other work was done, whole per cent; null where nobody has waited yet. */
export const usedShare = ({ usedS, lostS }: WaitsTodayDto): number | null =>
  usedS + lostS <= 0 ? null : Math.round((100 * usedS) / (usedS + lostS));

/** The hours waited today: those used, those lost, and the share. */
export function WaitsTodayPart({ waits }: { waits: WaitsTodayDto }) {
  const styles = useStyles();
  const share = usedShare(waits);
  return (
    <SideSection title="Waits today">
      {share === null ? (
        <Txt kind="small" tone="ink2" style={styles.none}>
          Nobody has waited yet.
        </Txt>
      ) : (
        <View style={styles.figures}>
          <Figure word="used">
            <Duration seconds={waits.usedS} kind="numL" />
          </Figure>
          <Figure word="lost">
            <Duration seconds={waits.lostS} kind="numL" />
          </Figure>
          <Figure word="used so far">
            <Num value={String(share)} unit="%" kind="numL" />
          </Figure>
        </View>
      )}
    </SideSection>
  );
}

const Figure = ({ word, children }: { word: string; children: ReactNode }) => (
  <View>
    {children}
    <Txt kind="small" tone="ink2">
      {word}
    </Txt>
  </View>
);

const useStyles = makeStyles(() => ({
  none: { marginTop: 6 },
  figures: { flexDirection: 'row', flexWrap: 'wrap', columnGap: 28, rowGap: 8, marginTop: 6 },
}));
