import { View } from 'react-native';
import type { AlertDto } from '@/shared/contract/alert';
import { alertPath } from '@/shared/contract/alert-kinds';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { PressableLink } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { StageGlyph } from '../stage/stage-glyph';
import { stages } from '../stage/stages';
import { makeStyles } from '../theme/make-styles';
import { radius, stroke } from '../theme/tokens';
import { useTheme } from '../theme/theme';
import { lookOf, outcomeOf, titleOf } from './alert-words';

/** An alert that is settled: what it was, and what came of it. The row opens its charge. */
export function AlertRow({ alert, now, onGo }: { alert: AlertDto; now: number; onGo: (path: string) => void }) {
  const styles = useStyles();
  const { colors } = useTheme();
  const { zone, marks } = useFormats();
  const at = (instant: string) => moment(Date.parse(instant), zone, now, marks);
  const { mark, word } = lookOf(alert);
  const look = stages[mark];
  const live = alertPath(alert);
  return (
    <PressableLink
      href={live}
      onGo={() => onGo(live)}
      label={`${word}, ${titleOf(alert)}, ${at(alert.raisedAt)}. ${outcomeOf(alert, at)}`}
      style={({ pressed }) => [styles.row, pressed && styles.pressed]}
    >
      <View
        style={[
          styles.block,
          !look.bare && { backgroundColor: colors[look.color] },
          mark === 'check-due' && { borderWidth: stroke.control, borderColor: colors.ink },
        ]}
      >
        <StageGlyph stage={mark} size={14} tone={look.onColor} />
      </View>
      <View style={styles.words}>
        <Txt bold>{`${word}, ${titleOf(alert)}`}</Txt>
        <Txt kind="small" tone="ink2">
          {[alert.seen, outcomeOf(alert, at)].filter(Boolean).join(' ')}
        </Txt>
      </View>
      <Txt kind="numS" nowrap>
        {at(alert.raisedAt)}
      </Txt>
    </PressableLink>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: {
    flexDirection: 'row',
    alignItems: 'flex-start',
    columnGap: 11,
    minHeight: 56,
    paddingVertical: 10,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  pressed: { backgroundColor: colors.well },
  block: { width: 22, height: 22, borderRadius: radius.mark, alignItems: 'center', justifyContent: 'center' },
  words: { flex: 1, minWidth: 0 },
}));
