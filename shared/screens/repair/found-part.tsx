import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useSearch } from '@/shared/client/search';
import { Link } from '@/shared/ui/primitives/link';
import { StatusRegion } from '@/shared/ui/primitives/live-region';
import { PressableLink } from '@/shared/ui/primitives/pressable-link';
import { Txt } from '@/shared/ui/primitives/txt';
import { hitWords } from '@/shared/ui/repair/hit-words';
import { makeStyles } from '@/shared/ui/theme/make-styles';

/** What a search finds beside the list that is shown: other repairs, spares and charges. Each leads to its page. */
export function FoundPart({
  looked,
  listed,
  onGo,
}: {
  looked: string;
  /** Ids of the repairs that stand in the list already. */
  listed: readonly string[];
  onGo: (path: string) => void;
}) {
  const styles = useStyles();
  const query = useSearch(looked);
  if (looked === '') return null;
  if (query.isError)
    return (
      <View style={{ rowGap: 4, alignItems: 'flex-start' }}>
        <Txt tone="ink2">{`Spares and charges could not be looked through. ${sentenceOf(query.error)}`}</Txt>
        <Link title="Look again" onPress={() => void query.refetch()} />
      </View>
    );
  if (!query.data || query.isPlaceholderData) return null;
  const hits = query.data.hits.filter(({ id }) => !listed.includes(id)).map(hitWords);
  return (
    <View style={{ rowGap: 6 }}>
      <StatusRegion text={hits.length === 0 ? 'Nothing else found' : `${hits.length} more found`} />
      {hits.length === 0 ? null : (
        <>
          <Txt kind="heading" heading={2}>
            Found elsewhere
          </Txt>
          <View role="list" aria-label="Found elsewhere">
            {hits.map(({ kind, title, text, path }) => (
              <View key={path} role="listitem">
                <PressableLink
                  href={path}
                  onGo={() => onGo(path)}
                  label={`${kind} ${title}, ${text}`}
                  style={({ pressed }) => [styles.row, pressed && styles.pressed]}
                >
                  <Txt kind="small" tone="ink2" style={styles.kind}>
                    {kind}
                  </Txt>
                  <View style={styles.names}>
                    <Txt bold>{title}</Txt>
                    <Txt kind="small" tone="ink2">
                      {text}
                    </Txt>
                  </View>
                </PressableLink>
              </View>
            ))}
          </View>
          {query.data.more ? (
            <Txt kind="small" tone="ink2">
              There is more. Type another letter to find it.
            </Txt>
          ) : null}
        </>
      )}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: {
    flexDirection: 'row',
    columnGap: 12,
    minHeight: 56,
    alignItems: 'center',
    paddingVertical: 6,
    borderBottomWidth: 1,
    borderBottomColor: colors.line,
  },
  pressed: { backgroundColor: colors.well },
  kind: { width: 64 },
  names: { flexShrink: 1, flexGrow: 1 },
}));
