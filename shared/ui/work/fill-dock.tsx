import { View } from 'react-native';
import type { PlanBlockDto } from '@/shared/contract/bench-plan';
import { clock } from '../format/clock';
import { useFormats } from '../format/formats';
import { EN_DASH } from '../format/marks';
import { Button } from '../primitives/button';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { OnSurface } from '../theme/surface';
import { makeStyles } from '../theme/make-styles';
import { radius, stroke } from '../theme/tokens';

/** A fill that somebody has: white, ink outline, thick left edge, with its next step. */
export function FillDock({
  block,
  now,
  busy,
  offline,
  problem,
  onOpen,
  onBegin,
  onDone,
  onGiveBack,
}: {
  block: PlanBlockDto;
  now: number;
  busy: boolean;
  offline: boolean;
  problem: string | null;
  onOpen: () => void;
  onBegin: () => void;
  onDone: () => void;
  onGiveBack: () => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const [from, to] = [Date.parse(block.from), Date.parse(block.to)];
  const at = (ms: number) => clock(ms, zone, marks);
  const begun = block.stint?.state === 'begun';
  const done = block.stint?.state === 'done';
  const words = begun ? `begun ${at(from)}, to ${at(Math.max(now, to))}` : `${at(from)}${EN_DASH}${at(to)}`;
  return (
    <OnSurface tone="sheet">
      <View role="group" aria-label={block.title} style={styles.dock}>
        <View style={styles.head}>
          <View style={styles.words}>
            <Txt bold>{block.title}</Txt>
            <Txt kind="small" tone="ink2">
              {[words, block.place, done ? 'done' : null].filter(Boolean).join(' · ')}
            </Txt>
          </View>
          <Link kind="small" align="right" title="look" label={`Look at ${block.title}`} onPress={onOpen} />
        </View>
        {block.tooLong && !done ? (
          <Txt kind="small" bold tone="alarm">
            {block.tooLong}
          </Txt>
        ) : null}
        {problem ? (
          <Txt kind="small" bold tone="alarm" role="alert">
            {problem}
          </Txt>
        ) : null}
        {done ? null : (
          <View style={styles.acts}>
            <Button
              look="line"
              size="small"
              title="Give back"
              label={`Give back ${block.title}`}
              disabled={offline || busy}
              onPress={onGiveBack}
            />
            <Button
              grow
              size="small"
              title={begun ? 'Done' : 'Begin'}
              label={`${begun ? 'Done' : 'Begin'}: ${block.title}`}
              disabled={offline}
              busy={busy}
              onPress={begun ? onDone : onBegin}
            />
          </View>
        )}
      </View>
    </OnSurface>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  dock: {
    backgroundColor: colors.sheet,
    borderWidth: stroke.control,
    borderColor: colors.ink,
    borderLeftWidth: 5,
    borderRadius: radius.dock,
    paddingHorizontal: 12,
    paddingVertical: 8,
    rowGap: 6,
  },
  head: { flexDirection: 'row', alignItems: 'center', columnGap: 12 },
  words: { flex: 1, minWidth: 0, rowGap: 1 },
  acts: { flexDirection: 'row', columnGap: 8 },
}));
