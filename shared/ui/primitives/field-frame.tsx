import { useState, type ReactNode } from 'react';
import { View } from 'react-native';
import { StageGlyph } from '../stage/stage-glyph';
import { makeStyles } from '../theme/make-styles';
import { web } from '../theme/web-props';
import { Txt } from './txt';

/** The verdict of the numbers about what was typed: green and inside, or red and outside; no error of typing. */
export interface FieldVerdict {
  inside: boolean;
  text: string;
}

/** What every field has around its box. */
export interface FieldFrameProps {
  label: string;
  /** One line under the box. */
  hint?: string;
  /** A sentence that says what to change; takes the place at the right of the label and never moves the box. */
  error?: string;
  verdict?: FieldVerdict;
  /** A link or a small note at the right of the label; gives way to an error. */
  beside?: ReactNode;
}

export const fieldIds = (id: string) => ({ label: `${id}-label`, note: `${id}-note`, hint: `${id}-hint` });

/** The ids that describe the box: the error or verdict, and the hint. */
export function describedBy(id: string, { error, verdict, hint }: FieldFrameProps): string | undefined {
  const ids = fieldIds(id);
  return (
    [(error ?? verdict) !== undefined && ids.note, hint !== undefined && ids.hint].filter(Boolean).join(' ') ||
    undefined
  );
}

/** Mean advance of the label face at 14 px, measured over the sentences of look.md §8; errs to the wide side. */
const glyphWidth = 7.7;
/** Whether label and note stand on one line of this width; an unknown width (0) counts as wide enough. */
export const noteFits = (label: string, note: string, width: number): boolean =>
  width === 0 || (label.length + note.length) * glyphWidth + 8 + 22 <= width;

/**
 * Label line, box, hint. The note stands in the label line; a sentence too long for it takes the hint's place under
 * the box and leaves its sign above, so that the box itself never moves.
 */
export function FieldFrame({
  id,
  onLabelPress,
  children,
  ...props
}: FieldFrameProps & { id: string; onLabelPress?: () => void; children: ReactNode }) {
  const styles = useStyles();
  const [width, setWidth] = useState(0);
  const ids = fieldIds(id);
  const { label, hint, error, verdict, beside } = props;
  const bad = error !== undefined || verdict?.inside === false;
  const note = error ?? verdict?.text;
  const inLine = note === undefined || noteFits(label, note, width);
  const words = note ? (
    <Txt kind="label" tone={bad ? 'alarm' : 'ready'} nativeID={ids.note} style={inLine ? styles.noteText : styles.hint}>
      {note}
    </Txt>
  ) : null;
  return (
    <View onLayout={({ nativeEvent }) => setWidth(Math.round(nativeEvent.layout.width))}>
      <View style={styles.line}>
        <Txt
          kind="label"
          nativeID={ids.label}
          {...web(onLabelPress ? { onClick: onLabelPress } : {})}
          style={styles.label}
        >
          {label}
        </Txt>
        {note !== undefined ? (
          <View style={styles.note}>
            <StageGlyph stage={bad ? 'overdue' : 'ready'} size={18} />
            {inLine ? words : null}
          </View>
        ) : (
          beside
        )}
      </View>
      {children}
      {inLine ? null : words}
      {hint && inLine ? (
        <Txt kind="small" tone="ink2" nativeID={ids.hint} style={styles.hint}>
          {hint}
        </Txt>
      ) : null}
    </View>
  );
}

const useStyles = makeStyles(() => ({
  line: {
    flexDirection: 'row',
    alignItems: 'flex-end',
    justifyContent: 'space-between',
    columnGap: 8,
    minHeight: 19,
    marginBottom: 5,
  },
  label: { flexShrink: 0 },
  note: { flexDirection: 'row', alignItems: 'flex-end', columnGap: 4, flexShrink: 1 },
  noteText: { flexShrink: 1, textAlign: 'right' },
  hint: { marginTop: 5 },
}));
