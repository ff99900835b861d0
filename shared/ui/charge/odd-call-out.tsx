import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { parseNumber } from '../format/parse';
import { LevelColumn } from '../level-column/level-column';
import { CallOut } from '../primitives/call-out';
import { Span, Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { stageOf } from './card-model';
import type { LogValues } from './log-form';
import type { OddReading } from './odd-reading';

/** What is odd about a reading, beside its picture, and what to check first. */
export function OddCallOut({ odd, charge, typed }: { odd: OddReading; charge: ChargeDto; typed: LogValues }) {
  const styles = useStyles();
  const volts = typed.groupVolts.map((text) => {
    const read = parseNumber(text);
    return read.ok ? read.value : null;
  });
  const expected = charge.groups.map((group) => group.clipVolts ?? group.volts);
  const others = expected.filter((_, group) => group !== odd.group);
  const middle = others.reduce((sum, one) => sum + one, 0) / Math.max(1, others.length);
  return (
    <CallOut tone="red" announce>
      <View style={styles.row}>
        <View style={styles.words}>
          <Txt bold>{odd.seen}</Txt>
          {odd.beside ? <Txt style={styles.beside}>{odd.beside}</Txt> : null}
        </View>
        {odd.group !== null && volts.every((one) => one !== null) ? (
          <LevelColumn
            place="list"
            stage={stageOf(charge)}
            groups={volts.map((one, group) => ({ volts: one, odd: group === odd.group }))}
            targetVolts={middle}
            toleranceVolts={charge.toleranceVolts}
            scale={{ kind: 'near' }}
            tab={false}
            twin=""
          />
        ) : null}
      </View>
      <Txt style={styles.check}>
        <Span bold>Check first:</Span> {odd.checkFirst}
      </Txt>
    </CallOut>
  );
}

const useStyles = makeStyles(() => ({
  row: { flexDirection: 'row', columnGap: 16, alignItems: 'flex-start' },
  words: { flex: 1 },
  beside: { marginTop: 2 },
  check: { marginTop: 8 },
}));
