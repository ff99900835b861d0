import { StyleSheet, View } from 'react-native';
import { Icon } from '../icons/icon';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';

/** Not for this role: which role can, and who that is here. Never a blank page. */
export function Forbidden({
  what,
  roles,
  people,
  action,
}: {
  /** 'Channels are given out' */
  what: string;
  /** 'a foreman or a manager' */
  roles: string;
  /** Their names in this workshop. */
  people: readonly string[];
  action?: { title: string; onPress: () => void };
}) {
  const names = people.length > 1 ? `${people.slice(0, -1).join(', ')} or ${people.at(-1)}` : people[0];
  return (
    <View style={styles.box}>
      <Icon name="lock" size={46} tone="ink2" />
      <Txt kind="titleWide">{`${what} by ${roles}.`}</Txt>
      {names ? <Txt tone="ink2">{`Here that is ${names}.`}</Txt> : null}
      {action ? <Button look="line" title={action.title} onPress={action.onPress} /> : null}
    </View>
  );
}

const styles = StyleSheet.create({ box: { paddingTop: 40, rowGap: 12, maxWidth: 560, alignItems: 'flex-start' } });
