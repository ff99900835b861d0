import type { ChargeDto } from '@/shared/contract/charge';
import { Button } from '../primitives/button';
import { ButtonRow } from '../screen/foot';
import { wayOut, type WayOut } from './check-way-out';
import { useNextStep, type NextStepPlaces } from './next-step-box';

const noteId = 'checks-note';

/** The one next step: clip on, or the way out where it is ruled out. The reason stands above it. */
export function useCheckFoot({
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
}): NextStepPlaces {
  const way = wayOut(charge);
  const why = charge.startBlockedBy ?? (offline ? 'Clipping on needs the connection.' : null);
  return useNextStep({
    problem,
    note: why,
    noteId,
    children: (
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
    ),
  });
}
