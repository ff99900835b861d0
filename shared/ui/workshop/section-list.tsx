import { Pressable, View } from 'react-native';
import { goInside } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { web } from '../theme/web-props';
import { sections, type SectionKey } from './sections';

/** The settings' own list, left on the desk. */
export function SectionList({ current, onGo }: { current: SectionKey; onGo: (key: SectionKey) => void }) {
  const styles = useStyles();
  return (
    <View role="navigation" aria-label="Parts of the workshop" style={styles.list}>
      {sections.map(({ key, title }) => (
        <Pressable
          key={key}
          role="link"
          onPress={goInside(() => onGo(key))}
          style={[styles.item, key === current && styles.current]}
          {...web({
            href: `/workshop?section=${key}`,
            'aria-current': key === current ? 'page' : undefined,
            dataSet: { press: '' },
          })}
        >
          <Txt bold={key === current} tone={key === current ? 'ink' : 'ink2'}>
            {title}
          </Txt>
        </Pressable>
      ))}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  list: { width: 156, flexShrink: 0 },
  item: { minHeight: 48, justifyContent: 'center', paddingLeft: 14, borderLeftWidth: 1, borderLeftColor: colors.line },
  current: { borderLeftWidth: 5, borderLeftColor: colors.ink, paddingLeft: 10 },
}));
