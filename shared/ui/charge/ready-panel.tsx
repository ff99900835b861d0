import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { moment } from '../format/clock';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { NBSP } from '../format/marks';
import {
  ampHours,
  celsius,
  deviationNumber,
  millivoltsNumber,
  plannedAmps,
  tolerance,
  voltsNumber,
} from '../format/quantities';
import { LevelColumn } from '../level-column/level-column';
import { FactList, type Fact } from '../primitives/fact-list';
import { Num } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { firstName, stageOf } from './card-model';

/** The verdict that let the module go: how far off the farthest group is, and all groups near the target. */
export function ReadyPanel({ charge, stacked = false }: { charge: ChargeDto; stacked?: boolean }) {
  const styles = useStyles();
  const { marks } = useFormats();
  const verdict = charge.restChecks.at(-1)?.verdict;
  if (!verdict) return null;
  const worst = verdict.groups[verdict.worstGroup];
  const off = worst?.deviationVolts ?? 0;
  const side = Math.abs(off) < 5e-4 ? 'on the mark' : off < 0 ? 'below' : 'above';
  return (
    <View style={stacked ? styles.stack : styles.row}>
      <View style={styles.words}>
        <Txt kind="small" tone="ink2">
          Farthest off
        </Txt>
        <Num kind="hero" value={millivoltsNumber(Math.abs(off))} unit="mV" />
        <Txt tone="ink2">{`G${verdict.worstGroup + 1} ${side}, ${tolerance(charge.toleranceVolts)} allowed`}</Txt>
        <Txt kind="small" tone="ink2" style={styles.target}>
          Target
        </Txt>
        <Num kind="numL" value={voltsNumber(charge.targetVolts, marks)} unit="V" />
      </View>
      <LevelColumn
        place="check"
        stage={stageOf(charge)}
        groups={verdict.groups.map((group) => ({
          volts: group.volts,
          odd: !group.within,
          text: deviationNumber(group.deviationVolts),
        }))}
        targetVolts={charge.targetVolts}
        toleranceVolts={charge.toleranceVolts}
        scale={{ kind: 'near' }}
        name={charge.spare.label}
        labels
        tab
      />
    </View>
  );
}

/** How it went: who clipped on, the rest, plan and truth, the charge. */
export function ReadyFacts({ charge, now }: { charge: ChargeDto; now: number }) {
  const { zone, marks } = useFormats();
  const started = charge.startedAt === null ? null : Date.parse(charge.startedAt);
  const check = charge.restChecks.at(-1);
  const ready = charge.readyAt === null ? null : Date.parse(charge.readyAt);
  const off = charge.currentEndAt === null ? null : Date.parse(charge.currentEndAt);
  const by = charge.events.find((event) => event.kind === 'started')?.by ?? charge.person;
  const facts: Fact[] = [];
  if (started !== null)
    facts.push({
      name: 'Clipped on',
      value: `${moment(started, zone, now, marks)}${by ? `, ${firstName(by.name)}` : ''}`,
    });
  if (off !== null && check)
    facts.push({
      name: 'Rested',
      value: `${duration((Date.parse(check.at) - off) / 1000, 'minute')}${check.celsius === null ? '' : ` at ${celsius(check.celsius)}`}`,
      note: check.early ? 'checked early' : undefined,
    });
  if (started !== null && ready !== null)
    facts.push({
      name: 'Planned, came true',
      value: `${duration((Date.parse(charge.plannedReady.likely) - started) / 1000)}, ${duration((ready - started) / 1000)}`,
    });
  facts.push({
    name: charge.direction === 'discharge' ? 'Taken out' : 'Brought in',
    value: `${ampHours(charge.deliveredAh, marks)} at${NBSP}${plannedAmps(charge.option.amps, marks)}`,
  });
  return <FactList facts={facts} />;
}

const useStyles = makeStyles(() => ({
  row: {
    flexDirection: 'row',
    justifyContent: 'space-between',
    alignItems: 'flex-start',
    columnGap: 12,
    marginTop: 16,
    marginBottom: 8,
  },
  stack: { rowGap: 16, marginTop: 16, marginBottom: 8, alignItems: 'flex-start' },
  words: { flexShrink: 1 },
  target: { marginTop: 22 },
}));
