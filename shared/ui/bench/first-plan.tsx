import { View } from 'react-native';
import { Button } from '../primitives/button';
import { TickMark } from '../primitives/choice-row';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { StageGlyph } from '../stage/stage-glyph';
import { makeStyles } from '../theme/make-styles';
import { web } from '../theme/web-props';

export interface PlanNeed {
  key: string;
  /** 'A charger' */
  title: string;
  /** '6 channels', or what is missing. */
  detail: string;
  done: boolean;
  /** Where it is entered; left out where this person may not. */
  enter?: { title: string; path: string };
}

/** What a first plan needs, and what of it is there. */
export function FirstPlan({
  needs,
  onGo,
}: {
  /** null: not known yet. */
  needs: readonly PlanNeed[] | null;
  onGo: (path: string) => void;
}) {
  const styles = useStyles();
  return (
    <View>
      {needs ? (
        <>
          <Txt kind="label" tone="ink2" heading={2} style={styles.heading}>
            What a first plan needs
          </Txt>
          <View role="list">
            {needs.map(({ key, title, detail, done, enter }) => (
              <View key={key} role="listitem" style={styles.row}>
                <View style={styles.mark} {...web({ role: 'img' })} aria-label={done ? 'there' : 'missing'}>
                  {done ? <StageGlyph stage="ready" size={24} /> : <TickMark on={false} />}
                </View>
                <View style={styles.words}>
                  <Txt bold>{title}</Txt>
                  <Txt kind="small" tone="ink2">
                    {detail}
                  </Txt>
                </View>
                {!done && enter ? (
                  <Button
                    look="line"
                    size="small"
                    title={enter.title}
                    label={`${enter.title}: ${title.toLowerCase()}`}
                    onPress={() => onGo(enter.path)}
                  />
                ) : null}
              </View>
            ))}
          </View>
        </>
      ) : null}
      <View style={styles.quick}>
        <Txt kind="small" tone="ink2">
          For a number at once, without any of this:
        </Txt>
        <Link kind="small" title="quick estimate" href="/estimate" onPress={() => onGo('/estimate')} />
      </View>
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  heading: { marginTop: 14, marginBottom: 8 },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    minHeight: 55,
    paddingVertical: 6,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  mark: { width: 26, alignItems: 'center' },
  words: { flex: 1, minWidth: 0 },
  quick: {
    flexDirection: 'row',
    alignItems: 'center',
    flexWrap: 'wrap',
    columnGap: 6,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
}));
