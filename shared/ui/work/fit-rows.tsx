import { View } from 'react-native';
import type { FitDto, FreeStretchDto } from '@/shared/contract/bench-plan';
import { leastPartMinutes } from '@/shared/contract/work-terms';
import { NBSP } from '../format/marks';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { fitNow, type FitNow } from './fit-now';
import { fitDetail } from './fit-words';
import { WorkName } from './work-name';
import { workTitle } from './work-words';

type Fitting = Extract<FitNow, { fits: true }>;

/** The work that fits a free stretch, each piece with *Take it*, and what just does not, with by how much. */
export function FitRows({
  stretch,
  fits,
  now,
  most,
  busyWith,
  offline,
  problem,
  onTake,
}: {
  stretch: FreeStretchDto;
  fits: readonly FitDto[];
  now: number;
  /** Shown at most, of those that fit and of those that do not. */
  most: { fitting: number; beside: number };
  /** Id of the work that is being taken. */
  busyWith: string | null;
  offline: boolean;
  /** Why a piece was not taken. */
  problem: { workId: string; text: string } | null;
  onTake: (fit: FitDto, as: Fitting) => void;
}) {
  const styles = useStyles();
  const judged = fits.map((fit) => ({ fit, as: fitNow(fit, stretch, now) }));
  const fitting = judged.flatMap(({ fit, as }) => (as.fits ? [{ fit, as }] : [])).slice(0, most.fitting);
  const beside = judged
    .flatMap(({ fit, as }) => (as.fits ? [] : [{ fit, as }]))
    // What lacks time is nearer at hand than what lacks a skill.
    .sort((a, b) => (a.as.overByMinutes ?? Infinity) - (b.as.overByMinutes ?? Infinity))
    .slice(0, most.beside);
  return (
    <View>
      {fitting.length === 0 ? (
        <Txt tone="ink2">{fits.length === 0 ? 'No other work is open.' : 'Nothing that is open fits.'}</Txt>
      ) : null}
      <View role="list" aria-label="Work that fits">
        {fitting.map(({ fit, as }) => (
          <View key={fit.work.id} role="listitem" style={styles.row}>
            <View style={styles.words}>
              <WorkName bold work={fit.work} />
              <Txt kind="small" tone="ink2">
                {fitDetail(fit, as.minutes)}
              </Txt>
              {problem?.workId === fit.work.id ? (
                <Txt kind="small" bold tone="alarm" role="alert">
                  {problem.text}
                </Txt>
              ) : null}
            </View>
            <Button
              look="line"
              title="Take it"
              label={`Take it: ${workTitle(fit.work)}`}
              busy={busyWith === fit.work.id}
              disabled={offline}
              describedBy={offline ? `fits-offline-${stretch.from}` : undefined}
              onPress={() => onTake(fit, as)}
            />
          </View>
        ))}
        {beside.map(({ fit, as }) => (
          <View key={fit.work.id} role="listitem" style={styles.row}>
            <View style={styles.words}>
              <WorkName tone="ink2" work={fit.work} />
              <Txt kind="small" tone="ink2">
                {`${leastDetail(fit.work)} · ${as.because}`}
              </Txt>
            </View>
          </View>
        ))}
      </View>
      {offline ? (
        <Txt kind="small" tone="ink2" nativeID={`fits-offline-${stretch.from}`}>
          No connection: work is taken when it is back.
        </Txt>
      ) : null}
    </View>
  );
}

/** What it takes at least: '30 min', of work that is done in parts '15 min or more of 60'. */
const leastDetail = ({ splittable, leftLongMinutes }: FitDto['work']): string =>
  splittable && leftLongMinutes > leastPartMinutes
    ? `${leastPartMinutes}${NBSP}min or more of ${leftLongMinutes}`
    : `${leftLongMinutes}${NBSP}min`;

const useStyles = makeStyles(() => ({
  row: { flexDirection: 'row', alignItems: 'center', columnGap: 12, paddingVertical: 6, minHeight: 44 },
  words: { flex: 1, minWidth: 0, rowGap: 1 },
}));
