import { createContext, useCallback, useContext, useEffect, useMemo, useRef, useState, type ReactNode } from 'react';
import { View } from 'react-native';
import { makeStyles } from '../theme/make-styles';
import { motion, radius } from '../theme/tokens';
import { webStyle } from '../theme/web-props';
import { Link } from './link';
import { StatusRegion } from './live-region';
import { Txt } from './txt';

export interface ToastMessage {
  text: string;
  /** One way back: 'Take it back'. With it the toast stays longer. */
  action?: { title: string; onPress: () => void };
}

const ToastContext = createContext<(message: ToastMessage) => void>(() => {});

/** Shows a short word about what was just done. Never the only place where something important stands. */
export const useToast = () => useContext(ToastContext);

const stayMs = 6000;
const stayWithActionMs = 12_000;

/** Keeps one toast over the app and reads it out politely. The timer rests while the pointer or the focus is on it. */
export function ToastProvider({ children, bottom = 88 }: { children: ReactNode; bottom?: number }) {
  const [message, setMessage] = useState<ToastMessage | null>(null);
  const [resting, setResting] = useState(false);
  const show = useCallback((next: ToastMessage) => setMessage(next), []);
  const close = useCallback(() => setMessage(null), []);
  const timer = useRef<ReturnType<typeof setTimeout> | undefined>(undefined);
  useEffect(() => {
    if (!message || resting) return undefined;
    timer.current = setTimeout(close, message.action ? stayWithActionMs : stayMs);
    return () => clearTimeout(timer.current);
  }, [message, resting, close]);
  const shown = useMemo(
    () =>
      message ? (
        <View
          style={{ position: 'absolute', left: 16, right: 16, bottom, alignItems: 'center', pointerEvents: 'box-none' }}
        >
          <Toast message={message} onClose={close} onRest={setResting} />
        </View>
      ) : null,
    [message, bottom, close],
  );
  return (
    <ToastContext.Provider value={show}>
      {children}
      <StatusRegion text={message?.text ?? ''} />
      {shown}
    </ToastContext.Provider>
  );
}

/** The drawn toast: ink, one sentence, at most one way back. */
export function Toast({
  message,
  onClose,
  onRest,
}: {
  message: ToastMessage;
  onClose: () => void;
  onRest?: (resting: boolean) => void;
}) {
  const styles = useStyles();
  const { action } = message;
  return (
    <View
      style={[styles.toast, appearing]}
      onPointerEnter={() => onRest?.(true)}
      onPointerLeave={() => onRest?.(false)}
      {...({ onFocus: () => onRest?.(true), onBlur: () => onRest?.(false) } as object)}
    >
      <Txt tone="onInk" style={styles.text}>
        {message.text}
      </Txt>
      {action ? (
        <Link
          title={action.title}
          tone="onInk"
          onPress={() => {
            action.onPress();
            onClose();
          }}
        />
      ) : null}
    </View>
  );
}

const appearing = webStyle({
  animationKeyframes: [{ from: { opacity: 0 }, to: { opacity: 1 } }],
  animationDuration: `${motion.state}ms`,
});

const useStyles = makeStyles(({ colors }) => ({
  toast: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 16,
    minHeight: 48,
    maxWidth: 560,
    paddingHorizontal: 16,
    borderRadius: radius.control,
    backgroundColor: colors.ink,
    boxShadow: '0 2px 12px rgba(28,26,21,0.18)',
  },
  text: { flexShrink: 1, paddingVertical: 12 },
}));
