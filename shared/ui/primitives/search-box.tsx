import { useState } from 'react';
import { TextInput, View } from 'react-native';
import { Icon } from '../icons/icon';

import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { faceStacks, radius, stroke, touch, typeScale } from '../theme/tokens';
import { web, type WebKeyEvent } from '../theme/web-props';
import { IconButton } from './icon-button';

/** One line to look in a list, named by its placeholder: what it looks at. */
export function SearchBox({
  label,
  value,
  onChange,
  onSubmit,
  onKeyDown,
  autoFocus,
}: {
  /** 'Label, type or shelf' */
  label: string;
  value: string;
  onChange: (value: string) => void;
  /** Enter: takes what was found, where that can be. */
  onSubmit?: () => void;
  onKeyDown?: (event: WebKeyEvent) => void;
  autoFocus?: boolean;
}) {
  const styles = useStyles();
  const [focused, setFocused] = useState(false);
  const keyed = (event: WebKeyEvent) => {
    if (event.key !== 'Enter') return onKeyDown?.(event);
    // The renderer would take the focus away.
    event.preventDefault();
    onSubmit?.();
  };
  return (
    <View {...web({ role: 'search' })} style={[styles.box, focused && styles.focused]}>
      <Icon name="search" size={22} tone="ink2" />
      <TextInput
        value={value}
        onChangeText={onChange}
        onFocus={() => setFocused(true)}
        onBlur={() => setFocused(false)}
        placeholder={label}
        placeholderTextColor={styles.placeholder.color}
        aria-label={label}
        autoFocus={autoFocus}
        onKeyPress={(event) => keyed(event as unknown as WebKeyEvent)}
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
