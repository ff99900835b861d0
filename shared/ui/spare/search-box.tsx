import { useState } from 'react';
import { TextInput, View } from 'react-native';
import { Icon } from '../icons/icon';
import { IconButton } from '../primitives/icon-button';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { faceStacks, radius, stroke, touch, typeScale } from '../theme/tokens';
import { web } from '../theme/web-props';

/** One line to look in the stock, named by its placeholder. */
export function SearchBox({ value, onChange }: { value: string; onChange: (value: string) => void }) {
  const styles = useStyles();
  const [focused, setFocused] = useState(false);
  return (
    <View {...web({ role: 'search' })} style={[styles.box, focused && styles.focused]}>
      <Icon name="search" size={22} tone="ink2" />
      <TextInput
        value={value}
        onChangeText={onChange}
        onFocus={() => setFocused(true)}
        onBlur={() => setFocused(false)}
        placeholder="Label, type or shelf"
        placeholderTextColor={styles.placeholder.color}
        aria-label="Label, type or shelf"
        inputMode="search"
        autoCorrect={false}
        autoCapitalize="none"
        autoComplete="off"
        maxLength={60}
        {...web({ spellCheck: false })}
        style={styles.input}
      />
      {value ? (
        <View style={styles.clear}>
          <IconButton icon="cross" size={20} label="Clear the search" onPress={() => onChange('')} />
        </View>
      ) : null}
    </View>
  );
}

const useStyles = makeStyles((theme) => ({
  box: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 10,
    height: touch.min,
    paddingLeft: 14,
    borderRadius: radius.control,
    backgroundColor: theme.colors.sheet,
    ...innerFrame(theme, stroke.control, theme.colors.edge),
  },
  focused: innerFrame(theme, stroke.focus, theme.colors.focus),
  input: {
    flexGrow: 1,
    flexShrink: 1,
    flexBasis: 0,
    minWidth: 0,
    alignSelf: 'stretch',
    color: theme.colors.ink,
    fontFamily: faceStacks.text,
    fontSize: typeScale.body.size,
  },
  clear: { marginLeft: -10 },
  placeholder: { color: theme.colors.ink2 },
}));
