import { useId, useRef, useState } from 'react';
import { Pressable, View } from 'react-native';
import type { SpareDto } from '@/shared/contract/spare';
import { matchesAll } from '../format/matching';
import { useFormats } from '../format/formats';
import { Icon } from '../icons/icon';
import { BottomSheet } from '../primitives/bottom-sheet';
import { describedBy, FieldFrame } from '../primitives/field-frame';
import { StatusRegion } from '../primitives/live-region';
import { SearchBox } from '../primitives/search-box';
import { searchAbove } from '../primitives/searched';
import { Select } from '../primitives/select';
import { Txt } from '../primitives/txt';
import { focusSibling, steppedIndex } from '../primitives/walk';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { radius, stroke, touch } from '../theme/tokens';
import { web, type WebKeyEvent } from '../theme/web-props';
import { spareFacts, spareLine } from './spare-line';

interface SpareChoiceProps {
  /** undefined: the stock is not read yet. */
  spares: readonly SpareDto[] | undefined;
  /** '' while none is chosen. */
  spareId: string;
  error?: string;
  onChange: (spareId: string) => void;
  /** It was left, chosen or not. */
  onLeave: () => void;
}

/** The spare of a plan: out of a short list, or looked for by label, type or shelf in a longer one. */
export function SpareChoice(props: SpareChoiceProps) {
  const { spares, spareId, error, onChange, onLeave } = props;
  const { marks } = useFormats();
  if ((spares?.length ?? 0) > searchAbove) return <SearchedSpare {...props} spares={spares ?? []} />;
  return (
    <Select
      label="Spare"
      empty={spares ? 'Choose a spare' : 'Reading the stock'}
      value={spareId || null}
      options={(spares ?? []).map((spare) => ({ value: spare.id, label: spareLine(spare, marks) }))}
      onChange={onChange}
      onBlur={onLeave}
      error={error}
      required
    />
  );
}

/** A box like a field's that opens the sheet to look in. */
function SearchedSpare({
  spares,
  spareId,
  error,
  onChange,
  onLeave,
}: SpareChoiceProps & { spares: readonly SpareDto[] }) {
  const styles = useStyles();
  const { marks } = useFormats();
  const id = useId();
  const [open, setOpen] = useState(false);
  const chosen = spares.find((spare) => spare.id === spareId);
  const words = chosen ? spareLine(chosen, marks) : 'Choose a spare';
  const close = () => {
    setOpen(false);
    onLeave();
  };
  return (
    <FieldFrame id={id} label="Spare" error={error}>
      <Pressable
        role="button"
        aria-label={`Spare: ${words}`}
        onPress={() => setOpen(true)}
        {...web({
          'aria-haspopup': 'dialog',
          'aria-describedby': describedBy(id, { label: 'Spare', error }),
          dataSet: { press: '' },
        })}
        style={({ pressed }) => [styles.box, error !== undefined && styles.bad, pressed && styles.pressed]}
      >
        <Txt numberOfLines={1} tone={chosen ? 'ink' : 'ink2'} style={styles.words}>
          {words}
        </Txt>
        <Icon name="down" size={20} />
      </Pressable>
      {open ? (
        <SpareSheet
          spares={spares}
          spareId={spareId}
          onClose={close}
          onChoose={(next) => {
            onChange(next);
            close();
          }}
        />
      ) : null}
    </FieldFrame>
  );
}

/** The stock, looked in as one types. Enter takes the only one found; the arrow keys walk. */
function SpareSheet({
  spares,
  spareId,
  onChoose,
  onClose,
}: {
  spares: readonly SpareDto[];
  spareId: string;
  onChoose: (spareId: string) => void;
  onClose: () => void;
}) {
  const styles = useStyles();
  const { marks } = useFormats();
  const [typed, setTyped] = useState('');
  const list = useRef<View>(null);
  const found = spares.filter((spare) => matchesAll([spare.label, spare.typeName, spare.shelfPlace], typed));
  const [only] = found;
  const enterList = (event: WebKeyEvent) => {
    const first = (list.current as unknown as HTMLElement | null)?.querySelector?.<HTMLElement>('[role="button"]');
    if (event.key !== 'ArrowDown' || !first) return;
    event.preventDefault();
    first.focus();
  };
  const walk = (event: WebKeyEvent, at: number) => {
    const next = steppedIndex(event.key, at, found.length);
    if (next === null) return;
    event.preventDefault();
    focusSibling(event, next);
  };
  return (
    <BottomSheet open title="Choose a spare" aside={`${found.length} of ${spares.length}`} onClose={onClose}>
      <SearchBox
        label="Label, type or shelf"
        value={typed}
        onChange={setTyped}
        onKeyDown={enterList}
        onSubmit={() => {
          if (only && found.length === 1) onChoose(only.id);
        }}
        autoFocus
      />
      <StatusRegion text={typed.trim() === '' ? '' : `${found.length} of ${spares.length} found`} />
      {found.length === 0 ? <Txt style={styles.none}>{`No spare matches “${typed.trim()}”.`}</Txt> : null}
      <View ref={list} role="group" aria-label="Spares" style={styles.list}>
        {found.map((spare, index) => (
          <Pressable
            key={spare.id}
            role="button"
            aria-label={spareLine(spare, marks)}
            onPress={() => onChoose(spare.id)}
            {...web({
              'aria-current': spare.id === spareId ? 'true' : undefined,
              onKeyDown: (event) => walk(event, index),
              dataSet: { press: '' },
            })}
            style={({ pressed }) => [styles.row, pressed && styles.pressed]}
          >
            <Txt kind="numS">{spare.label}</Txt>
            <View style={styles.words}>
              <Txt numberOfLines={1}>{spare.typeName}</Txt>
              <Txt kind="small" tone="ink2" numberOfLines={1}>
                {spareFacts(spare, marks).join(', ')}
              </Txt>
            </View>
            {spare.id === spareId ? <Icon name="tick" size={20} /> : null}
          </Pressable>
        ))}
      </View>
    </BottomSheet>
  );
}

const useStyles = makeStyles((theme) => ({
  box: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 10,
    minHeight: touch.primary,
    paddingHorizontal: 14,
    borderRadius: radius.control,
    backgroundColor: theme.colors.sheet,
    ...innerFrame(theme, stroke.control, theme.colors.edge),
  },
  bad: innerFrame(theme, stroke.chosen, theme.colors.alarm),
  pressed: { backgroundColor: theme.colors.well },
  words: { flex: 1, minWidth: 0 },
  none: { marginTop: 12 },
  list: { marginTop: 8 },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    minHeight: touch.min,
    paddingVertical: 4,
    borderBottomWidth: 1,
    borderBottomColor: theme.colors.line,
  },
}));
