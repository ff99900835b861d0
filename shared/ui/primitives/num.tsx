import { StyleSheet, Text, type StyleProp, type TextStyle } from 'react-native';
import type { Band } from '@/calc/plan-types';
import { durationBand, durationParts, type Precision } from '../format/duration';
import { NBSP } from '../format/marks';
import { typeScale, type TypeRole } from '../theme/tokens';
import { Txt, type TextTone } from './txt';

/** Sizes a number can take. In the small ones the unit is larger, or it would fall under 13 px. */
export type NumKind = Extract<TypeRole, 'live' | 'hero' | 'numL' | 'numM' | 'numS' | 'numXS'>;

interface Look {
  kind?: NumKind;
  tone?: TextTone;
  align?: 'left' | 'right';
  style?: StyleProp<TextStyle>;
}

const unitShare = (kind: NumKind) => (kind === 'numS' || kind === 'numXS' ? 0.66 : 0.5);
const hourShare = (kind: NumKind) => (kind === 'numS' || kind === 'numXS' ? 0.72 : 0.56);
const small = (kind: NumKind, share: number): TextStyle => ({
  fontSize: typeScale[kind].size * share,
  fontWeight: '500',
  // The line keeps the height of the number.
  lineHeight: 0,
});
/** A leading 1 leaves a hole at the left edge of a hero number. */
const pulled = (kind: NumKind, text: string): TextStyle | null =>
  (kind === 'hero' || kind === 'live') && text.startsWith('1') ? { marginLeft: -0.06 * typeScale[kind].size } : null;

/** Spaces are text, so that a number reads and copies as '3 h 05'; their sizes keep the digits in the lead. */
const Space = ({ size }: { size: number }) => <Text style={{ fontSize: size, lineHeight: 0 }}>{NBSP}</Text>;

/** A number with its unit small and after: `<Num value={voltsNumber(3.968)} unit="V" kind="numL" />`. */
export function Num({
  value,
  unit,
  kind = 'numM',
  tone = 'ink',
  align,
  style,
}: Look & { value: string; unit?: string }) {
  return (
    <Txt kind={kind} tone={tone} align={align} nowrap style={[pulled(kind, value), style]}>
      {value}
      {unit ? <Space size={typeScale[kind].size * unitShare(kind) * 0.75} /> : null}
      {unit ? <Text style={small(kind, unitShare(kind))}>{unit}</Text> : null}
    </Txt>
  );
}

/** A stretch of time as a numeral: 3 small h 05, or 55 small min. Reads '3 h 05' to every reader. */
export function Duration({
  seconds,
  precision = 'plan',
  kind = 'numM',
  tone = 'ink',
  align,
  style,
}: Look & { seconds: number; precision?: Precision }) {
  const parts = durationParts(seconds, precision);
  if (parts.kind === 'minutes') return <Num value={parts.minutes} unit="min" {...{ kind, tone, align, style }} />;
  if (parts.kind === 'days') {
    return (
      <Txt kind={kind} tone={tone} align={align} nowrap style={[styles.days, style]}>
        {parts.text}
      </Txt>
    );
  }
  const size = typeScale[kind].size;
  return (
    <Txt kind={kind} tone={tone} align={align} nowrap style={[pulled(kind, parts.hours), style]}>
      {parts.hours}
      <Space size={size * 0.24} />
      <Text style={small(kind, hourShare(kind))}>h</Text>
      <Space size={size * 0.5} />
      {parts.minutes}
    </Txt>
  );
}

/** Likely time and its band beside it: never a time without its band. */
export function DurationWithBand({
  band,
  kind = 'numM',
  tone = 'ink',
}: {
  band: Band;
  kind?: NumKind;
  tone?: TextTone;
}) {
  return (
    <Txt nowrap tone={tone === 'ink' ? 'ink2' : tone}>
      <Duration seconds={band.p50} kind={kind} tone={tone} />
      {`  ${durationBand(band)}`}
    </Txt>
  );
}

const styles = StyleSheet.create({ days: { fontWeight: '500' } });
