import { View } from 'react-native';
import type { FitDto, FitsDto, PersonFitsDto } from '@/shared/contract/bench-plan';
import { firstName } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { NBSP } from '../format/marks';
import { Button } from '../primitives/button';
import { Select } from '../primitives/select';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { SideSection } from './side-section';

/** Shown at most, of each: those that fit, and those that just do not. */
const most = { fitting: 6, beside: 4 } as const;

/** Where a free stretch that was pressed leads to. */
export const fitsPartId = 'bench-fits';

type Stretch = PersonFitsDto['stretches'][number];

/** The stretch that is spoken of: the first in which something fits, else the first. */
export const stretchOf = (person: PersonFitsDto): Stretch | null =>
  person.stretches.find(({ fits }) => fits.some((fit) => fit.span !== null)) ?? person.stretches[0] ?? null;

/** Whose wait is shown while nobody has been chosen: of those with something that fits the one it begins soonest for. */
export function firstWithFits(fits: FitsDto): string | null {
  const waiting = fits.people.filter((person) => stretchOf(person) !== null);
  const fitting = waiting.filter((person) => stretchOf(person)?.fits.some((fit) => fit.span !== null));
  const from = (person: PersonFitsDto) => Date.parse(stretchOf(person)?.from ?? '');
  return [...(fitting.length > 0 ? fitting : waiting)].sort((a, b) => from(a) - from(b))[0]?.person.id ?? null;
}

/** 'Charge port flap, R-2419' */
const titleOf = ({ work }: FitDto): string => [work.title, work.repair?.number].filter(Boolean).join(', ');
/** '40 min · bay 1 · high voltage · urgent' */
const detailOf = ({ work, minutes }: FitDto): string =>
  [
    `${minutes}${NBSP}min${minutes < work.leftLongMinutes ? ` of ${work.leftLongMinutes}` : ''}`,
    work.place?.name,
    work.skill?.name,
    work.priority === 'high' || work.priority === 'urgent' ? work.priority : null,
  ]
    .filter(Boolean)
    .join(' · ');

/** The work that fits the wait of one person, each piece with *Give*; and what just does not fit, with the reason. */
export function FitsPart({
  fits,
  person: chosen,
  now,
  meId,
  busy,
  offline,
  problem,
  onPerson,
  onGive,
}: {
  fits: FitsDto;
  /** Whose wait; null: nobody has been chosen. */
  person: string | null;
  now: number;
  /** To oneself it says *Take it*. */
  meId: string;
  /** Id of the work that is being given. */
  busy: string | null;
  offline: boolean;
  /** Why a piece was not given. */
  problem: { workId: string; text: string } | null;
  onPerson: (personId: string) => void;
  onGive: (fit: FitDto, personId: string) => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const id = fits.people.some(({ person }) => person.id === chosen) ? chosen : firstWithFits(fits);
  const of = fits.people.find(({ person }) => person.id === id);
  const stretch = of ? stretchOf(of) : null;
  const others = fits.people.filter(({ stretches, person }) => stretches.length > 0 || person.id === id);
  const choose =
    others.length > 1 ? (
      <Select
        label="Whose wait"
        size="low"
        value={id}
        options={others.map(({ person }) => ({ value: person.id, label: firstName(person.name) }))}
        onChange={onPerson}
      />
    ) : null;
  if (!of || !stretch)
    return (
      <SideSection title="Fits a wait">
        <Txt kind="small" tone="ink2">
          {of ? `${firstName(of.person.name)} has no free stretch ahead.` : 'Nobody has a free stretch ahead.'}
        </Txt>
        {choose}
      </SideSection>
    );
  const name = firstName(of.person.name);
  const at = moment(Math.max(now, Date.parse(stretch.from)), zone, now, marks);
  const fitting = stretch.fits.filter((fit) => fit.span !== null).slice(0, most.fitting);
  const beside = stretch.fits.filter((fit) => fit.span === null).slice(0, most.beside);
  return (
    <SideSection id={fitsPartId} title={`Fits ${name}, ${stretch.minutes}${NBSP}min at ${at}`}>
      {fitting.length === 0 ? (
        <Txt kind="small" tone="ink2">
          Nothing that is open fits this stretch.
        </Txt>
      ) : null}
      <View role="list" aria-label={`Work that fits ${name}`} style={styles.list}>
        {fitting.map((fit) => (
          <View key={fit.work.id} role="listitem" style={styles.row}>
            <View style={styles.words}>
              <Txt bold style={styles.title}>
                {titleOf(fit)}
              </Txt>
              <Txt kind="small" tone="ink2">
                {detailOf(fit)}
              </Txt>
              {fit.suggested ? <Txt kind="small">best use of all waits</Txt> : null}
              {problem?.workId === fit.work.id ? (
                <Txt kind="small" bold tone="alarm" role="alert">
                  {problem.text}
                </Txt>
              ) : null}
            </View>
            <Button
              look="line"
              size="small"
              title={of.person.id === meId ? 'Take it' : 'Give'}
              label={of.person.id === meId ? `Take it: ${titleOf(fit)}` : `Give ${titleOf(fit)} to ${name}`}
              busy={busy === fit.work.id}
              disabled={offline}
              describedBy={offline ? 'bench-give-why' : undefined}
              onPress={() => onGive(fit, of.person.id)}
            />
          </View>
        ))}
        {beside.map((fit) => (
          <View key={fit.work.id} role="listitem" style={styles.row}>
            <View style={styles.words}>
              <Txt tone="ink2" style={styles.title}>
                {titleOf(fit)}
              </Txt>
              <Txt kind="small" tone="ink2">
                {`${detailOf(fit)} · ${fit.because ?? (fit.overByMinutes === null ? 'does not fit' : `${fit.overByMinutes} min too long`)}`}
              </Txt>
            </View>
          </View>
        ))}
      </View>
      {offline ? (
        <View nativeID="bench-give-why">
          <Txt kind="small" tone="ink2">
            Giving work needs the connection.
          </Txt>
        </View>
      ) : null}
      {choose}
    </SideSection>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 8,
    borderTopWidth: 1,
    borderTopColor: colors.line,
    paddingVertical: 8,
  },
  list: { marginTop: 8 },
  words: { flex: 1, minWidth: 0, rowGap: 1 },
  title: { fontSize: 15, lineHeight: 20 },
}));
