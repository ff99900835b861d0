import { View } from 'react-native';
import type { ProposalDto, ProposedMoveDto } from '@/shared/contract/bench-plan';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { Surface } from '../theme/surface';
import { radius, stroke } from '../theme/tokens';
import { placeWords } from './charge-words';

/** 'Late, weighted by priority: 44 min as it stands, none with it.' */
export function latenessSentence({ now, then }: ProposalDto['lateMinutes']): string {
  const words = (minutes: number) => (minutes < 0.5 ? 'none' : duration(minutes * 60, 'minute'));
  return now < 0.5 && then < 0.5
    ? 'Nothing is late either way; all is done sooner.'
    : `Late, weighted by priority: ${words(now)} as it stands, ${words(then)} with it.`;
}

/** A better plan than the present one: why, what moves, what stays, and the one tap that takes it. */
export function ProposalPart({
  proposal,
  now,
  busy,
  offline,
  problem,
  onTake,
  onByHand,
}: {
  proposal: ProposalDto;
  now: number;
  busy: boolean;
  offline: boolean;
  problem: string | null;
  onTake: () => void;
  /** Picks a charge of it, to be moved by hand. */
  onByHand: (chargeId: string) => void;
}) {
  const styles = useStyles();
  const first = proposal.moves[0];
  return (
    <Surface tone="sheet" role="region" aria-label="A better plan" style={styles.box}>
      <View style={styles.head}>
        <Txt kind="heading" heading={2}>
          A better plan
        </Txt>
        <Txt kind="small" tone="ink2">
          {proposal.proved ? 'the best there is' : 'the best found in time'}
        </Txt>
      </View>
      <Txt>{proposal.because}</Txt>
      <View role="list" aria-label="What would move">
        {proposal.moves.map((move) => (
          <Move key={move.chargeId} move={move} now={now} />
        ))}
      </View>
      {proposal.asTheyAre.length > 0 ? (
        <Txt kind="small" tone="ink2">
          {`${proposal.asTheyAre.join(', ')}.`}
        </Txt>
      ) : null}
      {proposal.unplaced.map(({ chargeId, title, because }) => (
        <Txt key={chargeId} kind="small" bold tone="alarm">
          {`No place for ${title}: ${because}`}
        </Txt>
      ))}
      <Txt kind="small" tone="ink2">
        {latenessSentence(proposal.lateMinutes)}
      </Txt>
      {problem ? (
        <Txt kind="small" bold tone="alarm" role="alert">
          {problem}
        </Txt>
      ) : null}
      {offline ? (
        <View nativeID="bench-take-why">
          <Txt kind="small" tone="ink2">
            Taking it needs the connection.
          </Txt>
        </View>
      ) : null}
      <Button
        size="small"
        title="Take this plan"
        onPress={onTake}
        busy={busy}
        disabled={offline}
        describedBy={offline ? 'bench-take-why' : undefined}
      />
      {first ? (
        <Button size="small" look="line" title="Change it by hand" onPress={() => onByHand(first.chargeId)} />
      ) : null}
    </Surface>
  );
}

function Move({ move, now }: { move: ProposedMoveDto; now: number }) {
  const styles = useStyles();
  const formats = useFormats();
  const then = placeWords(move.then, now, formats);
  const before = move.now.channelNames.length === 0 ? 'no channel yet' : placeWords(move.now, now, formats);
  return (
    <View role="listitem" style={styles.move}>
      <Txt bold style={styles.moveWords}>
        {move.text}
      </Txt>
      <Txt kind="small" tone="ink2">
        {then === before ? `${then}, where it would end up anyway` : `${then} instead of ${before}`}
      </Txt>
    </View>
  );
}

const useStyles = makeStyles((theme) => ({
  box: {
    borderRadius: radius.sheet,
    padding: 14,
    rowGap: 8,
    ...innerFrame(theme, stroke.control, theme.colors.edge),
  },
  head: {
    flexDirection: 'row',
    justifyContent: 'space-between',
    alignItems: 'baseline',
    columnGap: 8,
    flexWrap: 'wrap',
  },
  move: { borderTopWidth: 1, borderTopColor: theme.colors.line, paddingVertical: 6 },
  moveWords: { lineHeight: 20 },
}));
