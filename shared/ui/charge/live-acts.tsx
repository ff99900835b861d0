import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { ButtonRow, Foot } from '../screen/foot';
import { touch } from '../theme/tokens';
import { isFlowing, waitsForSwap } from './card-model';

export type LiveAct =
  'log' | 'hold' | 'resume' | 'stop' | 'checks' | 'check' | 'top-up' | 'label' | 'fit' | 'shelve' | 'drop';

interface ActWord {
  act: LiveAct;
  title: string;
}

/** The last check judged the groups outside, and nothing has flowed since. */
export const isOutside = (charge: ChargeDto): boolean =>
  charge.stage === 'check-due' && charge.restChecks.at(-1)?.verdict.within === false;

/** The acts of the present stage; the first is the next step. */
export function actsOf(charge: ChargeDto): ActWord[] {
  switch (charge.stage) {
    case 'planned':
    case 'queued':
      return [
        { act: 'checks', title: 'Checks before clipping on' },
        { act: 'drop', title: 'Drop' },
      ];
    case 'held':
      return [
        { act: 'resume', title: 'Resume' },
        { act: 'log', title: 'Log' },
        { act: 'stop', title: 'Stop' },
      ];
    case 'check-due':
      return isOutside(charge)
        ? [
            { act: 'top-up', title: 'Plan the top-up' },
            { act: 'check', title: 'Check again' },
            { act: 'shelve', title: 'Shelve' },
          ]
        : [
            { act: 'check', title: 'Enter the group voltages' },
            { act: 'stop', title: 'Stop' },
          ];
    case 'resting':
      return [
        { act: 'log', title: 'Log a reading' },
        { act: 'check', title: 'Check' },
        { act: 'stop', title: 'Stop' },
      ];
    case 'ready':
      return [
        { act: 'fit', title: 'It is fitted' },
        { act: 'label', title: 'Label' },
        { act: 'shelve', title: 'Shelve' },
      ];
    case 'fitted':
      return [{ act: 'label', title: 'Print the label again' }];
    case 'shelved':
    case 'stopped':
      return [];
    default:
      return [
        { act: 'log', title: 'Log a reading' },
        ...(isFlowing(charge) && !waitsForSwap(charge) ? ([{ act: 'hold', title: 'Hold' }] as const) : []),
        { act: 'stop', title: 'Stop' },
      ];
  }
}

/** Readings wait on this device, and pages are only opened; the rest needs the connection. */
const worksOffline: readonly LiveAct[] = ['log', 'label', 'check', 'checks'];

/** 'Hold and Stop need the connection.' */
export function offlineSentence(acts: readonly ActWord[]): string | null {
  const still = acts.filter(({ act }) => !worksOffline.includes(act)).map(({ title }) => title);
  if (still.length === 0) return null;
  return still.length === 1
    ? `${still[0]} needs the connection.`
    : `${still.slice(0, -1).join(', ')} and ${still.at(-1)} need the connection.`;
}

export interface LiveActsProps {
  charge: ChargeDto;
  offline: boolean;
  busy: boolean;
  onAct: (act: LiveAct) => void;
}

/** More letters than these beside each other would break a button's words on a phone. */
const lettersInRow = 32;

/** The acts as buttons: in the foot of the phone, in the head of the desk. */
function Buttons({ charge, offline, busy, onAct, small = false }: LiveActsProps & { small?: boolean }) {
  const acts = actsOf(charge);
  const [first, ...others] = acts;
  const button = ({ act, title }: ActWord, grow: boolean) => {
    const off = offline && !worksOffline.includes(act);
    return (
      <Button
        key={act}
        title={title}
        look={act === first?.act ? 'primary' : 'line'}
        size={small ? 'small' : 'normal'}
        grow={grow}
        busy={busy && act === 'resume'}
        disabled={off}
        describedBy={off ? liveNoteId : undefined}
        onPress={() => onAct(act)}
      />
    );
  };
  if (small) return <ButtonRow>{[...acts].reverse().map((one) => button(one, false))}</ButtonRow>;
  if (first && others.length > 0 && acts.reduce((sum, { title }) => sum + title.length, 0) > lettersInRow)
    return (
      <View style={{ rowGap: touch.gap }}>
        {button(first, false)}
        <ButtonRow>{others.map((one) => button(one, true))}</ButtonRow>
      </View>
    );
  return <ButtonRow>{acts.map((one) => button(one, one.act === first?.act))}</ButtonRow>;
}

export const liveNoteId = 'live-note';

/** On the desk the acts stand at the top right, the next step last. */
export const LiveHeadActs = (props: LiveActsProps) =>
  actsOf(props.charge).length === 0 ? null : <Buttons {...props} small />;

/** Why an act failed or cannot be done now. */
export function LiveNote({
  charge,
  offline,
  problem,
}: Pick<LiveActsProps, 'charge' | 'offline'> & { problem: string | null }) {
  const wait = offline ? offlineSentence(actsOf(charge)) : null;
  if (!problem && !wait) return null;
  return (
    <View nativeID={liveNoteId} role={problem ? 'alert' : undefined}>
      {problem ? (
        <Txt kind="label" tone="alarm">
          {problem}
        </Txt>
      ) : (
        <Txt kind="small" tone="ink2">
          {wait}
        </Txt>
      )}
    </View>
  );
}

/** The foot of the phone: what is to be said, and the acts with the next step first. */
export function LiveFoot({ problem, ...props }: LiveActsProps & { problem: string | null }) {
  const acts = actsOf(props.charge);
  const says = problem !== null || (props.offline && offlineSentence(acts) !== null);
  if (acts.length === 0 && !problem) return null;
  return (
    <Foot note={says ? <LiveNote {...props} problem={problem} /> : undefined}>
      {acts.length > 0 ? <Buttons {...props} /> : null}
    </Foot>
  );
}
