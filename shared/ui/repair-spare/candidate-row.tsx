import { View } from 'react-native';
import type { CandidateDto } from '@/shared/contract/repair';
import { age } from '../format/clock';
import { durationWithBand } from '../format/duration';
import { useFormats } from '../format/formats';
import { ampHours, voltsNumber } from '../format/quantities';
import { LevelColumn } from '../level-column/level-column';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { agoWords, agreementWords } from './candidate-words';

const sources = { measured: 'measured', label: 'from its label', guessed: 'guessed' } as const;

/** A spare for the target: how long it takes, what is wrong with it, and how it fits its neighbours later on. */
export function CandidateRow({
  candidate,
  targetVolts,
  window,
  chosen,
  now,
  busy,
  disabled,
  onReserve,
}: {
  candidate: CandidateDto;
  targetVolts: number;
  /** Limits of the module type, V; null: not known. */
  window: { lowVolts: number; highVolts: number } | null;
  /** It is reserved for this repair. */
  chosen: boolean;
  now: number;
  busy: boolean;
  /** Nothing can be sent now. */
  disabled: boolean;
  onReserve: () => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const { label, groupVolts, seconds, needsCharge, problems, ruledOut, reservedFor, agreement } = candidate;
  const elsewhere = reservedFor !== null && !chosen;
  const lowest = groupVolts === null || groupVolts.length === 0 ? null : Math.min(...groupVolts);
  return (
    <View style={styles.row} role="listitem" aria-label={label}>
      <View style={styles.head}>
        {groupVolts && groupVolts.length > 0 && window ? (
          <LevelColumn
            place="list"
            stage="planned"
            groups={groupVolts.map((volts) => ({ volts }))}
            targetVolts={targetVolts}
            scale={{ kind: 'window', ...window }}
            tab={false}
            twin=""
          />
        ) : null}
        <View style={styles.words}>
          <Txt kind="numS">{label}</Txt>
          <Txt bold={!ruledOut} tone={ruledOut ? 'ink3' : 'ink'}>
            {ruledOut || seconds === null
              ? 'Cannot be brought to the target'
              : needsCharge
                ? durationWithBand(seconds)
                : 'Within the tolerance: no charge needed'}
          </Txt>
          <Txt kind="small" tone="ink2">
            {[
              candidate.shelfPlace,
              `${ampHours(candidate.usedCapacityAh, marks)} ${sources[candidate.capacitySource]}`,
              lowest === null ? 'not read yet' : `lowest ${voltsNumber(lowest, marks)} V`,
              candidate.readAt === null ? null : `read ${agoWords(age(Date.parse(candidate.readAt), zone, now))}`,
              candidate.channelName,
            ]
              .filter((part) => part !== null)
              .join(' · ')}
          </Txt>
          {problems.map((problem) => (
            <Txt key={problem} kind="small" tone={ruledOut ? 'alarm' : 'ink2'}>
              {problem}
            </Txt>
          ))}
          {agreement ? (
            <Txt kind="small" tone="ink2">
              {agreementWords(agreement)}
            </Txt>
          ) : null}
          {elsewhere ? <Txt kind="small" tone="alarm">{`Reserved for ${reservedFor.number}`}</Txt> : null}
        </View>
      </View>
      {ruledOut || elsewhere || chosen ? null : (
        <Button
          look="line"
          size="small"
          title={`Reserve ${label}`}
          busy={busy}
          disabled={disabled}
          onPress={onReserve}
        />
      )}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: { rowGap: 8, paddingVertical: 12, borderBottomWidth: 1, borderBottomColor: colors.line },
  head: { flexDirection: 'row', columnGap: 14 },
  words: { flex: 1, minWidth: 0, rowGap: 3 },
}));
