import { memo, useMemo } from 'react';
import { View } from 'react-native';
import type { BoardDto } from '@/shared/contract/board';
import { makeStyles } from '../theme/make-styles';
import { WallCells } from './wall-cells';
import { WallEmpty } from './wall-empty';
import { StaleBand, WallHeader } from './wall-header';
import { isDim, wallLinkOf } from './wall-link';
import { countsOf, layoutOf, wallCards, type WallCard, type WallClock } from './wall-model';
import { WallRows } from './wall-rows';
import { useStage } from './wall-stage';

export interface WallScreenProps {
  /** Null: not a board yet since this screen was switched on. */
  board: BoardDto | null;
  /** Last word of the server, epoch ms. */
  heardAt: number | null;
  /** When this screen began to listen. */
  since: number;
  now: number;
  /** 'this screen may fall asleep' */
  note?: string | null;
}

/** The board on the wall, and what it says while it is not live. */
export function WallScreen({ board, heardAt, since, now, note }: WallScreenProps) {
  const styles = useStyles();
  const { width } = useStage();
  const link = wallLinkOf(heardAt, now, since);
  const stale = link === 'old' || link === 'dark';
  const cards = useMemo(() => (board ? wallCards(board.charges) : []), [board]);
  const dim = board !== null && isDim(board.openToday, now);
  // Nothing moves while it is old: the board stands at the last instant heard, to the minute.
  const shown = Math.floor((stale ? (heardAt ?? now) : now) / 60_000) * 60_000;
  const at = useMemo<WallClock | null>(
    () => board && { now: shown, boardAt: Date.parse(board.at), zone: board.workshop.zone, stale },
    [board, shown, stale],
  );
  return (
    <View style={styles.page}>
      {stale ? (
        <StaleBand workshop={board?.workshop.name ?? null} since={heardAt} now={now} />
      ) : (
        <View style={dim && styles.dim}>
          <WallHeader
            workshop={board?.workshop.name ?? ''}
            counts={board ? countsOf(cards) : ''}
            heardAt={heardAt}
            live={link === 'live' && heardAt !== null}
            now={now}
            note={note}
          />
        </View>
      )}
      {board && at && link !== 'dark' ? <Board board={board} cards={cards} at={at} width={width} dim={dim} /> : null}
    </View>
  );
}

/** Drawn anew once a minute or when something changed, not with every second of the header. */
const Board = memo(function Board({
  board,
  cards,
  at,
  width,
  dim,
}: {
  board: BoardDto;
  cards: readonly WallCard[];
  at: WallClock;
  width: number;
  dim: boolean;
}) {
  const styles = useStyles();
  const layout = layoutOf(cards.length);
  if (layout === 'empty')
    return (
      <View style={dim && styles.dim}>
        <WallEmpty board={board} width={width} />
      </View>
    );
  return layout === 'upTo6' || layout === 'seven' ? (
    <WallRows cards={cards} at={at} width={width} dim={dim} />
  ) : (
    <WallCells cards={cards} at={at} width={width} dim={dim} />
  );
});

const useStyles = makeStyles(() => ({ page: { flex: 1 }, dim: { opacity: 0.5 } }));
