import { View } from 'react-native';
import type { RepairDto } from '@/shared/contract/repair';
import { repairStepNames, repairSteps, type RepairStep } from '@/shared/contract/repair-steps';
import { channelsOf, markOf } from '../charge/card-model';
import { useFormats } from '../format/formats';
import { volts } from '../format/quantities';
import { Txt } from '../primitives/txt';
import { StageGlyph } from '../stage/stage-glyph';
import { stages, type StageMark } from '../stage/stages';
import { makeStyles } from '../theme/make-styles';
import { useTheme } from '../theme/theme';
import { radius, stroke } from '../theme/tokens';
import { useBreakpoint } from '../theme/use-breakpoint';
import { presentStep, stepNumber, thenWords } from './repair-words';

type Step = Pick<RepairDto['steps'][number], 'step' | 'state'>;

/** Seven bars: done in ink, the present one in its stage's colour, blocked in amber, to come as an outline. */
export function StepBars({
  steps,
  mark,
  small = false,
}: {
  steps: readonly Step[];
  /** Stage of the repair's charge: the hue of the charging step. */
  mark: StageMark | null;
  /** In a row of a list. */
  small?: boolean;
}) {
  const { colors } = useTheme();
  const styles = useStyles();
  const hue = mark === null || stages[mark].bare ? colors.ink3 : colors[stages[mark].color];
  const amber = (state: Step['state']) => state === 'blocked' || (state === 'present' && mark === 'check-due');
  return (
    <View aria-hidden style={[styles.bars, small && styles.few]}>
      {steps.map(({ step, state }) => (
        <View
          key={step}
          style={[
            styles.bar,
            small && styles.smallBar,
            state === 'done' && { backgroundColor: colors.ink },
            state === 'present' && { backgroundColor: hue },
            state === 'to-come' && styles.toCome,
            amber(state) && styles.amber,
            state === 'blocked' && mark === 'overdue' && { backgroundColor: colors.alarm },
          ]}
        />
      ))}
    </View>
  );
}

/** What stands under a step on the desk: its name, and what it brought. */
function underStep(step: RepairStep, repair: RepairDto, target: string | null): string {
  const name = repairStepNames[step];
  if (step === 'target' && target) return `${name}, ${target}`;
  if (step === 'spare' && (repair.spare ?? repair.charge?.spare))
    return `${name}, ${(repair.spare ?? repair.charge?.spare)?.label ?? ''}`;
  if (step === 'charge' && repair.charge) {
    const where = channelsOf(repair.charge);
    return `${name}, ${stages[markOf(repair.charge)].word.toLowerCase()}${where ? ` on ${where}` : ''}`;
  }
  return name;
}

/** The strip of a repair's page: 'Charge, step 5 of 7', and who must decide where it is blocked. */
export function StepStrip({ repair, deciders }: { repair: RepairDto; deciders: string | null }) {
  const styles = useStyles();
  const { marks } = useFormats();
  const wide = useBreakpoint() === 'wide';
  const present = presentStep(repair.steps);
  const mark = repair.charge ? markOf(repair.charge) : null;
  const said =
    repair.state === 'open'
      ? present
        ? `${repairStepNames[present.step]}, step ${stepNumber(present.step)} of ${repairSteps.length}`
        : `All ${repairSteps.length} steps done`
      : repair.state === 'deleted'
        ? 'Deleted'
        : repair.state === 'archived'
          ? 'Handed over, in the archive'
          : 'Handed over';
  const blocked = present?.state === 'blocked';
  const toCome = repair.state === 'open' ? thenWords(repair.steps) : '';
  const aside = blocked ? (deciders ? `${deciders} must decide` : 'blocked') : toCome;
  const target = repair.target ? volts(repair.target.volts, marks) : null;
  return (
    <View role="group" aria-label={`Steps of the repair: ${said}`} style={styles.strip}>
      <StepBars steps={repair.steps} mark={mark} />
      {wide ? (
        <View style={styles.names}>
          {repair.steps.map(({ step, state }) => (
            <Txt
              key={step}
              kind="small"
              tone={state === 'done' || state === 'to-come' ? 'ink2' : 'ink'}
              bold={state === 'present' || state === 'blocked'}
              style={styles.name}
            >
              {underStep(step, repair, target)}
            </Txt>
          ))}
        </View>
      ) : null}
      {wide && !blocked && repair.state === 'open' ? null : (
        <View style={styles.said}>
          <View style={styles.words}>
            {blocked ? <StageGlyph stage="overdue" size={20} tone="ink" /> : null}
            <Txt kind="label">{said}</Txt>
          </View>
          <Txt kind="small" tone="ink2" align="right" style={styles.aside}>
            {aside}
          </Txt>
        </View>
      )}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  strip: { rowGap: 6 },
  bars: { flexDirection: 'row', columnGap: 4 },
  few: { columnGap: 4, width: 116 },
  bar: { flexGrow: 1, flexShrink: 1, flexBasis: 0, height: 8, borderRadius: radius.mark },
  smallBar: { height: 8 },
  toCome: { borderWidth: stroke.control, borderColor: colors.edge },
  amber: { backgroundColor: colors.checkDue, borderWidth: stroke.control, borderColor: colors.ink },
  names: { flexDirection: 'row', columnGap: 4 },
  name: { flexGrow: 1, flexShrink: 1, flexBasis: 0 },
  said: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', columnGap: 12 },
  words: { flexDirection: 'row', alignItems: 'center', columnGap: 8, flexShrink: 0 },
  aside: { flexShrink: 1 },
}));
