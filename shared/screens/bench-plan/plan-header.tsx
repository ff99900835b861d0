import { useWindowDimensions, View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useSaveDaySheet } from '@/shared/client/papers';
import type { BenchPlanDto } from '@/shared/contract/bench-plan';
import { countWords, daysWords, nextFreeWords } from '@/shared/ui/bench-plan/charge-words';
import { DayBar } from '@/shared/ui/bench-plan/day-bar';
import { date } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { IconButton } from '@/shared/ui/primitives/icon-button';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { makeStyles } from '@/shared/ui/theme/make-styles';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import type { useDays } from './use-days';

/** From this window on the desk's heading has room for its words and its controls in one line, px. */
const oneLineFrom = 1360;
const between = '\u2003';

interface Shown {
  plan: BenchPlanDto | undefined;
  days: ReturnType<typeof useDays>;
}

/** Day, counts and the next free channel in words. */
function useWords({ plan, days }: Shown): string[] {
  const formats = useFormats();
  if (!plan) return [];
  const free = plan.day === days.today ? nextFreeWords(plan.channels, days.now, formats) : null;
  return [daysWords(plan, formats.zone), countWords(plan), ...(free ? [free] : [])];
}

/** The heading: what is shown, the days before and after, the day sheet, and *Plan a charge*. */
export function PlanHeader({ plan, days, onPlan }: Shown & { onPlan: () => void }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const size = useBreakpoint();
  const oneLine = useWindowDimensions().width >= oneLineFrom;
  const words = useWords({ plan, days });
  const sheet = useSaveDaySheet(days.day);
  const print =
    plan && days.days === 1 ? (
      <IconButton
        icon="print"
        framed={size === 'wide'}
        label="Save the day sheet for printing"
        disabled={sheet.isPending}
        onPress={() => sheet.save(marks.decimal)}
      />
    ) : null;
  const wide = size === 'wide';
  return (
    <>
      <HeaderBar
        title="Bench plan"
        sub={
          wide
            ? oneLine
              ? words.join(between)
              : undefined
            : plan
              ? `${plan.days === 1 ? date(Date.parse(plan.from), zone) : daysWords(plan, zone)} · ${countWords(plan)}`
              : undefined
        }
        tools={
          wide ? (
            <View style={styles.tools}>
              <DayBar day={days.day} days={days.days} today={days.today} onChange={days.show} />
              {print}
            </View>
          ) : (
            print
          )
        }
        action={wide ? <Button title="Plan a charge" icon="plus" size="small" onPress={onPlan} /> : undefined}
      />
      {wide && !oneLine && words.length > 0 ? (
        <Txt tone="ink2" style={styles.words}>
          {words.join(between)}
        </Txt>
      ) : null}
      {sheet.isError ? (
        <Txt bold tone="alarm" role="alert" style={[styles.problem, !wide && styles.inset]}>
          {`The day sheet could not be made. ${sentenceOf(sheet.error)}`}
        </Txt>
      ) : null}
    </>
  );
}

const useStyles = makeStyles(() => ({
  tools: { flexDirection: 'row', alignItems: 'center', columnGap: 8 },
  words: { marginTop: -8, marginBottom: 12 },
  problem: { marginBottom: 8 },
  inset: { marginHorizontal: 16 },
}));
