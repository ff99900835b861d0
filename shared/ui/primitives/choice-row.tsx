import type { ReactNode } from 'react';
import { Pressable, View } from 'react-native';
import { Icon } from '../icons/icon';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { OnSurface } from '../theme/surface';
import { radius, stroke } from '../theme/tokens';
import { web, type WebKeyEvent } from '../theme/web-props';
import { pressOnSpace, useSoftDisabled } from './pressing';
import { Txt } from './txt';
import { focusSibling, steppedIndex } from './walk';

/** The round mark of one out of several. */
export function RadioMark({ on }: { on: boolean }) {
  const styles = useStyles();
  return <View style={[styles.radio, on && styles.radioOn]}>{on ? <View style={styles.radioDot} /> : null}</View>;
}

/** The square mark of any out of several. */
export function TickMark({ on, disabled = false }: { on: boolean; disabled?: boolean }) {
  const styles = useStyles();
  return (
    <View style={[styles.tick, on && styles.tickOn, disabled && styles.tickOff]}>
      {on ? <Icon name="tick" size={20} tone={disabled ? 'ink3' : 'onInk'} /> : null}
    </View>
  );
}

export interface ChoiceRowProps {
  mark: 'radio' | 'tick';
  chosen: boolean;
  onPress: () => void;
  title: string;
  /** One line of meaning. */
  meaning?: string;
  /** Instead of title and meaning: a way row, a spare row. `title` still names it. */
  children?: ReactNode;
  disabled?: boolean;
  /** The frame stands this far outside the text column; 14 at most, 0 inside a list that cuts. */
  outset?: number;
}

/** A whole row to choose: chosen it gets the sheet's ground and an ink frame. */
export function ChoiceRow({
  mark,
  chosen,
  onPress,
  title,
  meaning,
  children,
  disabled = false,
  outset = 14,
  ...walking
}: ChoiceRowProps & RowWalking) {
  const styles = useStyles();
  const own = useSoftDisabled(disabled);
  const press = disabled ? undefined : onPress;
  return (
    <Pressable
      ref={own}
      role={mark === 'radio' ? 'radio' : 'checkbox'}
      aria-checked={chosen}
      aria-label={children ? title : undefined}
      onPress={press}
      {...web({
        tabIndex: walking.tabIndex,
        onKeyDown: (event) => {
          pressOnSpace(event, press);
          walking.onKeyDown?.(event);
        },
        dataSet: { press: '' },
      })}
      style={({ pressed }) => [
        styles.row,
        { marginHorizontal: -outset, paddingHorizontal: Math.max(outset, 12) },
        pressed && !chosen && !disabled && styles.pressed,
        chosen && styles.chosen,
      ]}
    >
      {children ? (
        <OnChosen chosen={chosen}>{children}</OnChosen>
      ) : (
        <>
          {mark === 'radio' ? <RadioMark on={chosen} /> : <TickMark on={chosen} disabled={disabled} />}
          <View style={styles.words}>
            <Txt bold={chosen || meaning !== undefined} tone={disabled ? 'ink3' : 'ink'} style={styles.title}>
              {title}
            </Txt>
            {meaning ? (
              <Txt kind="small" tone={disabled ? 'ink3' : 'ink2'}>
                {meaning}
              </Txt>
            ) : null}
          </View>
        </>
      )}
    </Pressable>
  );
}

const OnChosen = ({ chosen, children }: { chosen: boolean; children: ReactNode }) =>
  chosen ? <OnSurface tone="sheet">{children}</OnSurface> : <>{children}</>;

interface RowWalking {
  tabIndex?: 0 | -1;
  onKeyDown?: (event: WebKeyEvent) => void;
}

/** One out of several rows. Arrow keys walk and choose; Tab enters at the chosen one, or at the first. */
export function ChoiceList<V extends string>({
  label,
  value,
  choices,
  onChange,
  outset,
  required,
  describedBy,
}: {
  label: string;
  /** null: nothing is preselected. */
  value: V | null;
  choices: readonly { value: V; title: string; meaning?: string; disabled?: boolean; children?: ReactNode }[];
  onChange: (value: V) => void;
  outset?: number;
  required?: boolean;
  describedBy?: string;
}) {
  const entry = Math.max(
    0,
    choices.findIndex((choice) => choice.value === value),
  );
  const walk = (event: WebKeyEvent, at: number) => {
    const next = steppedIndex(event.key, at, choices.length);
    const choice = next === null ? undefined : choices[next];
    if (next === null || !choice) return;
    event.preventDefault();
    if (!choice.disabled) onChange(choice.value);
    focusSibling(event, next);
  };
  return (
    <View role="radiogroup" aria-label={label} {...web({ 'aria-required': required, 'aria-describedby': describedBy })}>
      {choices.map(({ value: own, ...choice }, index) => (
        <ChoiceRow
          key={own}
          {...choice}
          mark="radio"
          chosen={own === value}
          onPress={() => onChange(own)}
          outset={outset}
          tabIndex={index === entry ? 0 : -1}
          onKeyDown={(event) => walk(event, index)}
        />
      ))}
    </View>
  );
}

const useStyles = makeStyles((theme) => ({
  radio: {
    width: 22,
    height: 22,
    borderRadius: 11,
    ...innerFrame(theme, 2, theme.colors.edge),
    alignItems: 'center',
    justifyContent: 'center',
  },
  radioOn: innerFrame(theme, 2, theme.colors.ink),
  radioDot: { width: 12, height: 12, borderRadius: 6, backgroundColor: theme.colors.ink },
  tick: {
    width: 26,
    height: 26,
    borderRadius: radius.dock,
    ...innerFrame(theme, 2, theme.colors.edge),
    alignItems: 'center',
    justifyContent: 'center',
  },
  tickOn: { backgroundColor: theme.colors.ink, ...innerFrame(theme, 2, theme.colors.ink) },
  tickOff: { backgroundColor: theme.colors.well, boxShadow: 'none' },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    minHeight: 52,
    paddingVertical: 7,
    borderRadius: radius.sheet,
  },
  pressed: { backgroundColor: theme.colors.well },
  chosen: { backgroundColor: theme.colors.sheet, ...innerFrame(theme, stroke.chosen, theme.colors.ink) },
  words: { flex: 1, minWidth: 0 },
  title: { lineHeight: 20 },
}));
