import type { ChargeDto } from '@/shared/contract/charge';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { ButtonRow, Foot } from '../screen/foot';
import { wayOut, type WayOut } from './check-way-out';

const noteId = 'checks-note';

/** The one next step: clip on, or the way out where it is ruled out. The reason stands above it. */
export function CheckFoot({
  charge,
  offline,
  busy,
  problem,
  onStart,
  onWayOut,
}: {
  charge: ChargeDto;
  offline: boolean;
  busy: boolean;
  /** What the last try said, such as who has the channel. */
  problem: string | null;
  onStart: () => void;
  onWayOut: (way: WayOut) => void;
}) {
  const way = wayOut(charge);
  const why = charge.startBlockedBy ?? (offline ? 'Clipping on needs the connection.' : null);
  return (
    <Foot
      noteId={noteId}
      note={
        problem ? (
          <Txt kind="label" tone="alarm" role="alert">
            {problem}
          </Txt>
        ) : (
          (why ?? undefined)
        )
      }
    >
      <ButtonRow>
        <Button
          title={way ? 'Clip on' : 'Clip on and start the timer'}
          label="Clip on and start the timer"
          onPress={onStart}
          busy={busy}
          disabled={why !== null}
          describedBy={why !== null || problem ? noteId : undefined}
          grow
        />
        {way ? <Button title={way.title} onPress={() => onWayOut(way)} grow /> : null}
      </ButtonRow>
    </Foot>
  );
}
