import { View } from 'react-native';
import type { CheckItemDto } from '@/shared/contract/charge';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Icon } from '../icons/icon';
import { Button } from '../primitives/button';
import { Link } from '../primitives/link';
import { Span, Txt } from '../primitives/txt';
import { StageGlyph } from '../stage/stage-glyph';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { OnSurface } from '../theme/surface';
import { radius, stroke, touch } from '../theme/tokens';
import { firstName } from './card-model';

const lowerFirst = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1);
/** A detail longer than this stands only in the open check. */
const shortDetail = 52;

/** One check that is answered, by a person or by the numbers, or that is still to come. */
export function CheckLine({
  item,
  number,
  now,
  onChange,
}: {
  item: CheckItemDto;
  /** Its place, from 1. */
  number: number;
  now: number;
  /** Left out: nothing can be changed any more. */
  onChange?: () => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  if (item.by !== 'person') return <LockedLine item={item} />;
  if (item.answer === null) {
    const detail = lowerFirst(item.detail).replace(/\.$/, '');
    return (
      <View role="listitem" style={[styles.row, styles.ruled]}>
        <View style={styles.sign}>
          <Txt kind="numS" tone="ink2">
            {number}
          </Txt>
        </View>
        <View style={[styles.words, styles.coming]}>
          <Txt bold>{item.title}</Txt>
          {detail.length <= shortDetail ? (
            <Txt kind="small" tone="ink2" style={styles.shrink}>
              {detail}
            </Txt>
          ) : null}
        </View>
      </View>
    );
  }
  const yes = item.answer === 'yes';
  const who = [
    item.answeredBy ? firstName(item.answeredBy.name) : '',
    item.answeredAt ? moment(Date.parse(item.answeredAt), zone, now, marks) : '',
  ]
    .filter(Boolean)
    .join(' ');
  return (
    <View role="listitem" style={[styles.row, styles.ruled]}>
      <View style={styles.sign}>
        <StageGlyph stage={yes ? 'ready' : 'overdue'} size={24} />
      </View>
      <View style={styles.words}>
        <Txt tone={yes ? 'ink2' : 'alarm'}>
          <Span bold tone={yes ? 'ink' : 'alarm'}>{`${item.title}:`}</Span> {lowerFirst(yes ? item.yes : item.no)}
        </Txt>
        <Txt kind="small" tone="ink2">
          {[who, item.note].filter(Boolean).join(', ')}
        </Txt>
      </View>
      {onChange ? (
        <Link
          title="change"
          kind="small"
          label={`Change the answer to ${item.title.toLowerCase()}`}
          onPress={onChange}
          align="right"
        />
      ) : null}
    </View>
  );
}

/** Answered by the numbers: a lock, and in alarm where they rule it out. */
function LockedLine({ item }: { item: CheckItemDto }) {
  const styles = useStyles();
  const out = item.by === 'ruled-out';
  const comma = item.question.indexOf(',');
  const [lead, rest] =
    comma > 0 && comma < 24 ? [item.question.slice(0, comma + 1), item.question.slice(comma + 1)] : ['', item.question];
  return (
    <View role="listitem" style={[styles.row, styles.ruled]}>
      <View style={styles.sign}>
        <Icon name="lock" size={22} tone={out ? 'alarm' : 'ink'} />
      </View>
      <View style={styles.words}>
        <Txt tone="ink2">
          <Span bold tone={out ? 'alarm' : 'ink'}>{`${item.title}: ${lead}`}</Span>
          {lead ? rest : ` ${rest}`}
        </Txt>
        <Txt kind="small" tone="ink2">
          {item.detail}
        </Txt>
      </View>
      {out ? <StageGlyph stage="overdue" size={24} /> : null}
    </View>
  );
}

/** The one check that is open: its question and two answers, none of them preselected. */
export function OpenCheck({
  item,
  busy,
  disabled,
  problem,
  onAnswer,
}: {
  item: CheckItemDto;
  busy: boolean;
  disabled: boolean;
  problem: string | null;
  onAnswer: (answer: 'yes' | 'no') => void;
}) {
  const styles = useStyles();
  const answer = (kind: 'yes' | 'no') => (
    <Button
      key={kind}
      look="line"
      size="gloved"
      title={item[kind]}
      label={`${item[kind]}. ${item.title}`}
      busy={busy}
      disabled={disabled}
      onPress={() => onAnswer(kind)}
      grow
    />
  );
  return (
    <View role="listitem" style={styles.open}>
      <OnSurface tone="sheet">
        <Txt kind="heading" heading={2}>
          {item.question}
        </Txt>
        <Txt tone="ink2" style={styles.detail}>
          {item.detail}
        </Txt>
        <View style={styles.answers}>{(['yes', 'no'] as const).map(answer)}</View>
        {problem ? (
          <Txt kind="label" tone="alarm" role="alert" style={styles.detail}>
            {problem}
          </Txt>
        ) : null}
      </OnSurface>
    </View>
  );
}

const useStyles = makeStyles((theme) => ({
  row: { flexDirection: 'row', alignItems: 'center', columnGap: 12, minHeight: 55, paddingVertical: 6 },
  ruled: { borderTopWidth: 1, borderTopColor: theme.colors.line },
  sign: { width: 24, alignItems: 'center' },
  words: { flex: 1, minWidth: 0 },
  coming: { flexDirection: 'row', alignItems: 'baseline', columnGap: 8, flexWrap: 'wrap' },
  shrink: { flexShrink: 1 },
  open: {
    backgroundColor: theme.colors.sheet,
    borderRadius: radius.sheet,
    padding: 14,
    marginTop: 4,
    marginBottom: 12,
    ...innerFrame(theme, stroke.chosen, theme.colors.ink),
  },
  detail: { marginTop: 4 },
  answers: { flexDirection: 'row', columnGap: touch.gap, marginTop: 12 },
}));
