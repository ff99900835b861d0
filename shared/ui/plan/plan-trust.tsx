import type { ReactNode } from 'react';
import { View } from 'react-native';
import type { Band, ChargePlan, PlannedStep, PlanOption } from '@/calc/plan-types';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import type { LocaleMarks } from '../format/marks';
import { fixed } from '../format/number';
import { amps, ampHours, range, share, volts } from '../format/quantities';
import { Caution } from '../primitives/call-out';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { doubtWords, wayNames } from './way-words';

const stepNames = { 'pre-level': 'Pre-level', bulk: 'Bulk', trim: 'Trim' } as const;

/** What a step is for; a charge from a known end first goes there, then counts. */
function stepName({ knownEnd }: PlanOption, step: PlannedStep): string {
  if (step.precharge) return 'Low groups up first';
  if (knownEnd === undefined) return stepNames[step.kind];
  const toEnd = step.direction === (knownEnd === 'full' ? 'charge' : 'discharge');
  return toEnd ? `To ${knownEnd}` : `Count ${knownEnd === 'full' ? 'out' : 'in'}`;
}

/** 'Ends at 58 % of charge (56–60 %).' */
const endSocWords = ({ p10, p50, p90 }: Band, marks: LocaleMarks): string => {
  const percent = (soc: number) => fixed(soc * 100, 0, marks);
  return `Ends at ${share(p50)} of charge (${range(percent(p10), percent(p90), '%')}).`;
};

/** What is dialled in and taken apart, step by step. */
export function WhatItTakes({ option, channelNames }: { option: PlanOption; channelNames: (id: string) => string }) {
  const { marks } = useFormats();
  return (
    <View style={{ rowGap: 6 }}>
      <Txt kind="heading" heading={2}>
        What it takes
      </Txt>
      <Txt>{option.takes}</Txt>
      {option.endSoc ? <Txt>{endSocWords(option.endSoc, marks)}</Txt> : null}
      {option.steps.map((step, index) => (
        <Txt key={`${step.kind} ${index}`} kind="small" tone="ink2">
          {[
            option.steps.length > 1 ? `${index + 1}. ${stepName(option, step)}` : wayNames[step.way],
            step.channelIds.map(channelNames).join(', '),
            step.kind === 'bulk' && option.steps.length === 1
              ? ''
              : `G${step.groupIndexes.map((group) => group + 1).join(', G')}`,
            step.setVolts === null ? '' : `set ${volts(step.setVolts, marks)}`,
            step.setAmps === null ? '' : amps(step.setAmps, marks),
            ampHours(step.ampHours, marks),
            `${duration(step.stopS - step.startS, 'minute')} of current`,
          ]
            .filter(Boolean)
            .join(' · ')}
        </Txt>
      ))}
    </View>
  );
}

/** What closed charges have taught of the times, on how many it stands, and the way to reckon without it. */
export function LearnedLine({
  option,
  without,
  onWithout,
}: {
  option: Pick<PlanOption, 'timeFactorText'>;
  /** It is left out of the times. */
  without: boolean;
  onWithout: (without: boolean) => void;
}) {
  const text = without ? 'What closed charges have taught is left out of these times.' : option.timeFactorText;
  if (text === undefined) return null;
  return (
    <View>
      <Txt>{text}</Txt>
      <Link
        kind="small"
        tight
        title={without ? 'with what was learned' : 'without what was learned'}
        onPress={() => onWithout(!without)}
        style={{ alignSelf: 'flex-start' }}
      />
    </View>
  );
}

/** Which number makes most of the band, what was learned, and every caution of the plan and the way. */
export function HowFarToTrustIt({
  option,
  plan,
  learned,
}: {
  option: PlanOption;
  plan: ChargePlan;
  learned?: ReactNode;
}) {
  const doubt = doubtWords[option.dominant];
  const cautions = [...plan.cautions, ...option.cautions].filter(
    (caution, index, all) => all.findIndex((other) => other.text === caution.text) === index,
  );
  return (
    <View style={{ rowGap: 8 }}>
      <Txt kind="heading" heading={2}>
        How far to trust it
      </Txt>
      <Txt>
        {`Most of the band comes from ${doubt.name}.`}
        {option.narrowsByS >= 60 ? ` ${doubt.advice} would narrow it by ${duration(option.narrowsByS)}.` : ''}
      </Txt>
      {learned}
      {cautions.map((caution) => (
        <Caution key={caution.text}>{caution.text}</Caution>
      ))}
    </View>
  );
}
