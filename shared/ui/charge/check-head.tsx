import { View } from 'react-native';
import type { GroupVerdict } from '@/calc/plan-types';
import type { ChargeDto } from '@/shared/contract/charge';
import { useFormats } from '../format/formats';
import { deviationNumber, tolerance, voltsNumber } from '../format/quantities';
import { LevelColumn } from '../level-column/level-column';
import { Num } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

/** Target and count at the left, the groups against the tolerance at the right, as they are typed. */
export function CheckHead({
  charge,
  verdicts,
}: {
  charge: ChargeDto;
  /** One for each group; null: not typed yet. */
  verdicts: readonly (GroupVerdict | null)[];
}) {
  const styles = useStyles();
  const { marks } = useFormats();
  const inside = verdicts.filter((one) => one?.within).length;
  const groups = verdicts.map((verdict) =>
    verdict
      ? {
          volts: verdict.volts,
          odd: !verdict.within,
          text: deviationNumber(verdict.deviationVolts),
        }
      : // An empty vessel: nothing is read yet.
        { volts: charge.targetVolts - 1, text: '' },
  );
  return (
    <View style={styles.row}>
      <View>
        <Txt kind="small" tone="ink2">
          Target
        </Txt>
        <Num kind="numL" value={voltsNumber(charge.targetVolts, marks)} unit="V" />
        <Txt tone="ink2">{`${tolerance(charge.toleranceVolts)}, dashed`}</Txt>
        <Txt kind="small" tone="ink2" style={styles.inside}>
          Inside
        </Txt>
        <Num kind="numL" value={String(inside)} unit={`of ${verdicts.length}`} />
      </View>
      <LevelColumn
        place="check"
        stage="check-due"
        groups={groups}
        targetVolts={charge.targetVolts}
        toleranceVolts={charge.toleranceVolts}
        scale={{ kind: 'near' }}
        labels
        tab
        twin={twinOf(verdicts)}
      />
    </View>
  );
}

/** The fields beside it say each verdict; the picture says how many. */
function twinOf(verdicts: readonly (GroupVerdict | null)[]): string {
  const typed = verdicts.filter((one) => one !== null);
  return `${typed.filter((one) => one.within).length} of ${verdicts.length} groups inside, ${verdicts.length - typed.length} still to be read.`;
}

const useStyles = makeStyles(() => ({
  row: {
    flexDirection: 'row',
    justifyContent: 'space-between',
    alignItems: 'flex-start',
    columnGap: 12,
    // On the desk numbers and picture stay together.
    maxWidth: 460,
  },
  inside: { marginTop: 22 },
}));
