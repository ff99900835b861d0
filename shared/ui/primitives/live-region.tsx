import { useEffect, useRef, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { web } from '../theme/web-props';
import { Txt } from './txt';

/** Words for readers only. */
export const Hidden = ({ children }: { children: string }) => (
  <View style={styles.hidden}>
    <Txt>{children}</Txt>
  </View>
);

/**
 * The assertive region of the app, once per app: reads each new alert out once, however often the list comes again.
 * What is in the first list has been there before the person came and is not read.
 */
export function AlertRegion({ alerts }: { alerts: readonly { id: string; text: string }[] }) {
  const heard = useRef<Set<string> | null>(null);
  const [text, setText] = useState('');
  useEffect(() => {
    const first = heard.current === null;
    const known = (heard.current ??= new Set());
    const fresh = alerts.filter(({ id }) => !known.has(id));
    for (const { id } of fresh) known.add(id);
    if (!first && fresh.length > 0) setText(fresh.map((alert) => alert.text).join('. '));
  }, [alerts]);
  return (
    <View role="alert" style={styles.hidden} {...web({ 'aria-live': 'assertive' })}>
      <Txt>{text}</Txt>
    </View>
  );
}

/** The polite region of the app: stands empty until something has been done. Never put a running time in it. */
export const StatusRegion = ({ text }: { text: string }) => (
  <View style={styles.hidden} {...web({ role: 'status', 'aria-live': 'polite' })}>
    <Txt>{text}</Txt>
  </View>
);

const styles = StyleSheet.create({
  hidden: { position: 'absolute', width: 1, height: 1, overflow: 'hidden', margin: -1 },
});
