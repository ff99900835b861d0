import { Fragment } from 'react';
import { View } from 'react-native';
import type { CheckCode, CheckItemDto } from '@/shared/contract/charge';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { CheckLine, OpenCheck } from './check-item';

/** The check that is open: the one to be changed, else the first that a person has not answered. */
export const openCheck = (checks: readonly CheckItemDto[], changing: CheckCode | null): CheckItemDto | null =>
  checks.find((item) => item.code === changing && item.by === 'person') ??
  checks.find((item) => item.by === 'person' && item.answer === null) ??
  null;

/** The checks in their order, one open at a time. */
export function CheckList({
  checks,
  changing,
  now,
  busy,
  disabled,
  problem,
  closed,
  onChange,
  onAnswer,
}: {
  checks: readonly CheckItemDto[];
  /** An answered one that is open again. */
  changing: CheckCode | null;
  now: number;
  busy: boolean;
  /** No connection: answers are kept with the charge, so they need it. */
  disabled: boolean;
  /** Why the last answer was not taken. */
  problem: string | null;
  /** The timer runs, or it is over: the answers stand as they were given. */
  closed: boolean;
  onChange: (code: CheckCode) => void;
  onAnswer: (code: CheckCode, answer: 'yes' | 'no') => void;
}) {
  const styles = useStyles();
  const open = closed ? null : openCheck(checks, changing);
  const answered = checks.filter((item) => item.answer !== null).length;
  return (
    <View>
      <View style={styles.head}>
        <View style={styles.count}>
          <Txt kind="numL">{answered}</Txt>
          <Txt tone="ink2">{`of ${checks.length} answered`}</Txt>
        </View>
        <Txt kind="small" tone="ink2">
          kept with the charge
        </Txt>
      </View>
      <View role="list" aria-label="Checks before clipping on">
        {checks.map((item, index) => (
          <Fragment key={item.code}>
            {item.code === open?.code ? (
              <OpenCheck
                item={item}
                busy={busy}
                disabled={disabled}
                problem={problem}
                onAnswer={(answer) => onAnswer(item.code, answer)}
              />
            ) : (
              <CheckLine
                item={item}
                number={index + 1}
                now={now}
                onChange={closed ? undefined : () => onChange(item.code)}
              />
            )}
          </Fragment>
        ))}
      </View>
    </View>
  );
}

const useStyles = makeStyles(() => ({
  head: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'baseline', paddingBottom: 8 },
  count: { flexDirection: 'row', alignItems: 'baseline', columnGap: 8 },
}));
