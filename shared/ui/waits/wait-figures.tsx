import { View } from 'react-native';
import type { WaitsDto } from '@/shared/contract/waits';
import { NBSP } from '../format/marks';
import { Duration, Num } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { weekFigure } from './week-figure';

/** Under so many charges a middle value says little. */
export const fewCharges = 5;

/** '+4 min', '−12 min': later or sooner than planned. */
export const againstPlan = (seconds: number): string => {
  const minutes = Math.round(seconds / 60);
  return `${minutes > 0 ? '+' : minutes < 0 ? '−' : ''}${Math.abs(minutes)}${NBSP}min`;
};

/** The figures over the page, each with what it means. */
export function WaitFigures({ waits, today }: { waits: WaitsDto; today: string }) {
  const styles = useStyles();
  const week = weekFigure(waits.weeks, today);
  return (
    <View style={styles.row}>
      {week ? (
        <Figure title={week.title} note={week.note}>
          <Num value={String(Math.round(week.hours))} unit="h" kind="numL" />
        </Figure>
      ) : null}
      <Figure title="Wait of one charge" note="half of them waited less">
        {waits.charges === 0 ? <Txt kind="numL">–</Txt> : <Duration seconds={waits.medianS} kind="numL" />}
      </Figure>
      <Figure title="9 of 10 waited less than" note={`${waits.charges} charges`}>
        {waits.charges === 0 ? <Txt kind="numL">–</Txt> : <Duration seconds={waits.p90S} kind="numL" />}
      </Figure>
      <Figure
        title="Finish inside its band"
        note={`80 % is the aim${waits.plan === null ? '' : `; ${againstPlan(waits.plan.againstPlanS)} against the plan`}`}
      >
        {waits.plan === null ? (
          <Txt kind="numL">–</Txt>
        ) : (
          <Num value={String(Math.round(waits.plan.insideBand * 100))} unit="%" kind="numL" />
        )}
      </Figure>
    </View>
  );
}

function Figure({ title, note, children }: { title: string; note: string; children: React.ReactNode }) {
  const styles = useStyles();
  return (
    <View style={styles.figure}>
      <Txt kind="small" tone="ink2">
        {title}
      </Txt>
      {children}
      <Txt kind="small" tone="ink2">
        {note}
      </Txt>
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: { flexDirection: 'row', flexWrap: 'wrap', columnGap: 24, rowGap: 16 },
  figure: { flexGrow: 1, flexBasis: 150, borderLeftWidth: 3, borderLeftColor: colors.ink, paddingLeft: 14, rowGap: 2 },
}));
