import { useWatch, type UseFormReturn } from 'react-hook-form';
import { View } from 'react-native';
import type { ChemistryId, GroupVerdict } from '@/calc/plan-types';
import type { ChargeDto } from '@/shared/contract/charge';
import type { MeterDto } from '@/shared/contract/equipment';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { deviation } from '../format/quantities';
import { BoundField } from '../forms/bound';
import { GroupFields } from '../group-volts/group-fields';
import { asGroupForm, padAbove } from '../group-volts/group-form';
import { GroupPad } from '../group-volts/group-pad';
import { Button } from '../primitives/button';
import { Caution, StandingLine } from '../primitives/call-out';
import type { FieldVerdict } from '../primitives/field-frame';
import { Link } from '../primitives/link';
import { Columns } from '../screen/columns';
import { HeaderBar } from '../screen/header-bar';
import { Screen } from '../screen/screen';
import { makeStyles } from '../theme/make-styles';
import { useBreakpoint } from '../theme/use-breakpoint';
import { judgeTyped, type CheckValues } from './check-form';
import { CheckHead } from './check-head';
import { verdictWords } from './check-words';
import { Emergency } from './emergency';
import { useNextStep, type NextStepPlaces } from './next-step-box';
import { MeterSelect } from './read-again-sheet';
import { RestLine } from './rest-line';
import { earlyCheckWords } from './rest-words';
import { TopUpCallOut } from './top-up-call-out';

export interface CheckScreenProps {
  charge: ChargeDto;
  now: number;
  form: UseFormReturn<CheckValues, unknown, CheckValues>;
  meters: readonly MeterDto[];
  /** null: the type is not read yet, so that nothing is judged. */
  chemistry: ChemistryId | null;
  capacityAh: number | null;
  offline: boolean;
  busy: boolean;
  problem: string | null;
  wrong: string | null;
  onBack: () => void;
  onSave: () => void;
  onTopUp: () => void;
}

const noteId = 'check-note';

/** Group voltages against target and tolerance, judged as they are typed. */
export function CheckScreen(props: CheckScreenProps) {
  const { charge, now, form, meters, chemistry, capacityAh } = props;
  const { zone, marks } = useFormats();
  const typed = useWatch({ control: form.control, name: 'groupVolts' });
  const meterId = useWatch({ control: form.control, name: 'meterId' });
  const meter = meters.find((one) => one.id === meterId) ?? null;
  const verdicts: (GroupVerdict | null)[] =
    chemistry === null
      ? charge.groups.map(() => null)
      : judgeTyped(typed, {
          window: { ...charge, groupsInSeries: charge.groups.length },
          targetVolts: charge.targetVolts,
          toleranceVolts: charge.toleranceVolts,
          offsetVolts: (meter?.offsetMillivolts ?? 0) / 1000,
          chemistry,
          // Without the spare the verdict stands; what it needs is said once it is known.
          capacityAh: capacityAh ?? 1,
        });
  const rested = charge.currentEndAt ? (now - Date.parse(charge.currentEndAt)) / 1000 : null;
  const all = verdicts.every((one) => one !== null);
  const outside = verdicts.some((one) => one?.within === false);
  const next = useSaveStep(props, all, outside);
  return (
    <Screen
      header={
        <HeaderBar
          title="Check after rest"
          sub={[charge.title, charge.spare.label, rested === null ? '' : `rested ${duration(rested, 'minute')}`]
            .filter(Boolean)
            .join(' · ')}
          onBack={props.onBack}
        />
      }
      foot={next.foot}
    >
      <Columns
        work={
          <Work
            {...props}
            verdicts={verdicts}
            early={earlyCheckWords(charge, { now, zone, marks })}
            other={charge.meterId !== null && meterId !== charge.meterId}
            offset={meter && meter.offsetMillivolts !== 0 ? meter.offsetMillivolts / 1000 : null}
          />
        }
        side={
          <View style={{ rowGap: 16 }}>
            {all && outside && capacityAh !== null ? (
              <TopUpCallOut groups={verdicts.filter((one) => one !== null)} topUp={null} ruledOut={null} />
            ) : null}
            <Emergency charge={charge} chemistry={chemistry} />
            <StandingLine />
            {next.side}
          </View>
        }
      />
    </Screen>
  );
}

function Work({
  charge,
  now,
  form,
  meters,
  verdicts,
  early,
  offset,
  other,
}: CheckScreenProps & {
  verdicts: readonly (GroupVerdict | null)[];
  early: string | null;
  /** What is taken off each reading, V. */
  offset: number | null;
  /** Another meter than the pack's. */
  other: boolean;
}) {
  const styles = useStyles();
  const at = useBreakpoint();
  const count = charge.groups.length;
  const groups = asGroupForm(form);
  const verdictOf = (group: number): FieldVerdict | null => {
    const verdict = verdicts[group];
    return verdict ? { inside: verdict.within, text: verdictWords(verdict) } : null;
  };
  return (
    <View style={styles.stack}>
      {early ? <Caution>{early}</Caution> : null}
      <CheckHead charge={charge} verdicts={verdicts} />
      {charge.rest ? <RestLine charge={charge} now={now} /> : null}
      {at === 'phone' && count > padAbove ? (
        <GroupPad form={groups} count={count} verdictOf={verdictOf} />
      ) : (
        <GroupFields
          form={groups}
          count={count}
          columns={at === 'phone' ? (count > 3 ? 2 : 1) : Math.min(count, 3)}
          verdictOf={verdictOf}
        />
      )}
      <View style={styles.pair}>
        <View style={styles.half}>
          <MeterSelect
            form={form}
            meters={meters}
            hint={
              offset !== null ? `${deviation(-offset)} for its offset.` : other ? 'The pack’s own is best.' : undefined
            }
          />
        </View>
        <View style={styles.half}>
          <BoundField form={form} name="celsius" label="At the module" kind="decimal" unit="°C" />
        </View>
      </View>
    </View>
  );
}

/** In: it is ready. Out: the top-up. The one next step, and why it is not open yet. */
function useSaveStep(
  { offline, busy, problem, wrong, form, onSave, onTopUp, charge }: CheckScreenProps,
  all: boolean,
  outside: boolean,
): NextStepPlaces {
  const styles = useStyles();
  const count = charge.groups.length;
  const decide = `${count === 1 ? 'The group decides. Type it' : count === 2 ? 'Both groups decide. Type each' : `All ${count} groups decide. Type each`} with three decimals.`;
  const why = offline
    ? all
      ? 'Without a connection it is kept on this device and judged when it is back.'
      : decide
    : all
      ? null
      : decide;
  const again = () => {
    charge.groups.forEach((_, group) => form.setValue(`groupVolts.${group}`, '', { shouldDirty: true }));
    form.setFocus('groupVolts.0');
  };
  const says = problem ?? wrong;
  return useNextStep({
    problem: says,
    note: why,
    noteId,
    children: (
      <>
        <Button
          title={
            offline
              ? 'Keep the check on this device'
              : all && outside
                ? 'Plan the top-up'
                : all
                  ? 'Save it: in tolerance'
                  : 'Save the check'
          }
          onPress={all && outside && !offline ? onTopUp : onSave}
          busy={busy}
          describedBy={why || says ? noteId : undefined}
        />
        {all && outside ? (
          <View style={styles.links}>
            <Link title="Measure again" onPress={again} />
            {offline ? null : <Link title="Save it, plan later" onPress={onSave} disabled={busy} align="right" />}
          </View>
        ) : null}
      </>
    ),
  });
}

const useStyles = makeStyles(() => ({
  stack: { rowGap: 14 },
  pair: { flexDirection: 'row', columnGap: 12, alignItems: 'flex-start' },
  half: { flexGrow: 1, flexBasis: 0, minWidth: 0 },
  links: { flexDirection: 'row', justifyContent: 'space-between', marginTop: 4, marginBottom: -8 },
}));
