import type { ReactNode } from 'react';
import { View } from 'react-native';
import type { WaitsDto } from '@/shared/contract/waits';
import { duration } from '../format/duration';
import { Duration, Num } from '../primitives/num';
import { PressableLink } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { chargesWord, fewWords, usedShare } from './wait-words';
import { weekFigure } from './week-figure';

/** The way to the charges behind a number; `week` is the Monday of the week it stands for. */
export interface WaysBehind {
  hrefOf: (week?: string) => string;
  onGo: (path: string) => void;
}

/** The figures over the page, each with what it means and the way to the charges behind it. */
export function WaitFigures({ waits, today, ways }: { waits: WaitsDto; today: string; ways: WaysBehind }) {
  const styles = useStyles();
  const week = weekFigure(waits.weeks, today);
  const used = usedShare(waits);
  const { few, plan } = waits;
  return (
    <View style={styles.row}>
      {week ? (
        <Figure title={week.title} note={week.note} href={ways.hrefOf(week.monday)} ways={ways}>
          <Num value={String(Math.round(week.hours))} unit="h" kind="numL" />
        </Figure>
      ) : null}
      <Figure
        title="Wait that was used"
        note={used === null ? 'no wait in working hours' : usedNote(waits)}
        ways={ways}
      >
        {used === null ? <None /> : <Num value={String(Math.round(used * 100))} unit="%" kind="numL" />}
      </Figure>
      <Figure
        title="Wait of one charge"
        note={few ? fewWords : `9 of 10 under ${duration(waits.p90S, 'minute')}`}
        ways={ways}
      >
        {few ? <None /> : <Duration seconds={waits.medianS} precision="minute" kind="numL" />}
      </Figure>
      <Figure title="Finish inside its band" note={few ? fewWords : '80 % is the aim'} ways={ways}>
        {few || plan === null ? (
          <None />
        ) : (
          <Num value={String(Math.round(plan.insideBand * 100))} unit="%" kind="numL" />
        )}
      </Figure>
    </View>
  );
}

const usedNote = ({ usedHours, lostHours, charges }: WaitsDto): string =>
  `${Math.round(usedHours)} of ${Math.round(usedHours + lostHours)} h, ${chargesWord(charges)}`;

const None = () => <Txt kind="numL">–</Txt>;

function Figure({
  title,
  note,
  href,
  ways,
  children,
}: {
  title: string;
  note: string;
  href?: string;
  ways: WaysBehind;
  children: ReactNode;
}) {
  const styles = useStyles();
  const to = href ?? ways.hrefOf();
  return (
    <PressableLink
      href={to}
      onGo={() => ways.onGo(to)}
      style={({ pressed }) => [styles.figure, pressed && styles.pressed]}
    >
      <Txt kind="small" tone="ink2">
        {title}
      </Txt>
      {children}
      <Txt kind="small" tone="ink2">
        {note}
      </Txt>
    </PressableLink>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: { flexDirection: 'row', flexWrap: 'wrap', columnGap: 24, rowGap: 16 },
  figure: { flexGrow: 1, flexBasis: 150, borderLeftWidth: 3, borderLeftColor: colors.ink, paddingLeft: 14, rowGap: 2 },
  pressed: { backgroundColor: colors.well },
}));
