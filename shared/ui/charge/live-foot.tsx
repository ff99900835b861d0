import type { ChargeDto } from '@/shared/contract/charge';
import { Button } from '../primitives/button';
import { ButtonRow, Foot } from '../screen/foot';
import { isFlowing } from './card-model';

export type LiveAct = 'log' | 'hold' | 'resume' | 'stop' | 'checks' | 'check' | 'label' | 'fit' | 'shelve' | 'drop';

/** The acts of the present stage: the next step first, what ends it last. */
export function LiveFoot({
  charge,
  offline,
  busy,
  problem,
  onAct,
}: {
  charge: ChargeDto;
  /** Without a connection only readings can be logged; they wait on this device. */
  offline: boolean;
  busy: boolean;
  problem: string | null;
  onAct: (act: LiveAct) => void;
}) {
  const wait = offline ? 'No connection: readings are kept on this device, the rest waits.' : null;
  const button = (act: LiveAct, title: string, look: 'primary' | 'line' = 'line') => (
    <Button
      key={act}
      title={title}
      look={look}
      grow={look === 'primary'}
      busy={busy && act !== 'log'}
      disabled={offline && act !== 'log' && act !== 'label'}
      describedBy={wait ? 'live-note' : undefined}
      onPress={() => onAct(act)}
    />
  );
  const acts = (() => {
    switch (charge.stage) {
      case 'planned':
      case 'queued':
        return [button('checks', 'Checks before clipping on', 'primary'), button('drop', 'Drop')];
      case 'held':
        return [button('resume', 'Resume', 'primary'), button('log', 'Log'), button('stop', 'Stop')];
      case 'check-due':
        return [button('check', 'Enter the group voltages', 'primary'), button('stop', 'Stop')];
      case 'resting':
        return [button('log', 'Log a reading', 'primary'), button('check', 'Check now'), button('stop', 'Stop')];
      case 'ready':
        return [button('fit', 'It is fitted', 'primary'), button('label', 'Label'), button('shelve', 'Shelve')];
      case 'fitted':
      case 'shelved':
      case 'stopped':
        return [];
      default:
        return [
          button('log', 'Log a reading', 'primary'),
          ...(isFlowing(charge) ? [button('hold', 'Hold')] : []),
          button('stop', 'Stop'),
        ];
    }
  })();
  if (acts.length === 0 && !problem) return null;
  return (
    <Foot note={problem ?? wait ?? undefined} noteId="live-note">
      <ButtonRow>{acts}</ButtonRow>
    </Foot>
  );
}
