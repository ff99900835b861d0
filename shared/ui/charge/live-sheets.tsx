import type { ChargeDto } from '@/shared/contract/charge';
import type { PersonDto } from '@/shared/contract/people';
import { ClipOnSheet } from './clip-on-sheet';
import { EndSheet, type EndDraft } from './end-sheet';
import { HandOverSheet } from './hand-over-sheet';
import { OffSinceSheet } from './off-since-sheet';
import { StopSheet, type StopDraft } from './stop-sheet';

export type LiveSheet = 'stop' | 'hold' | 'hand-over' | 'fit' | 'shelve' | 'drop' | 'off-since' | 'clip-on';

/** Every write of the live screen. */
export interface ChargeActs {
  problem: string | null;
  busy: boolean;
  stop: (input: { reason: string; quarantine: boolean }) => void;
  hold: (reason: string) => void;
  currentOff: (at?: number) => void;
  nextStep: () => void;
  lookIn: () => void;
  handOver: (personId: string) => void;
  fit: (note: string | null) => void;
  shelve: (shelfPlace: string | null) => void;
  queue: (at: number) => void;
  drop: (after: () => void) => void;
}

export interface LiveSheetsProps {
  charge: ChargeDto;
  now: number;
  sheet: LiveSheet | null;
  acts: ChargeActs;
  people: readonly PersonDto[] | undefined;
  stopDraft: { value: StopDraft; set: (draft: StopDraft) => void };
  endDraft: { value: EndDraft; set: (draft: EndDraft) => void };
  onClose: () => void;
  /** It was dropped: there is nothing to show any more. */
  onDropped: () => void;
}

/** The sheet that is open over the live screen. */
export function LiveSheets(props: LiveSheetsProps) {
  const { charge, now, sheet, acts, people, stopDraft, endDraft, onClose, onDropped } = props;
  const common = { charge, busy: acts.busy, problem: acts.problem, onClose };
  switch (sheet) {
    case null:
      return null;
    case 'stop':
    case 'hold':
      return (
        <StopSheet
          {...common}
          kind={sheet}
          draft={stopDraft.value}
          onDraft={stopDraft.set}
          onConfirm={(input) => {
            if (sheet === 'stop') acts.stop(input);
            else acts.hold(input.reason);
          }}
        />
      );
    case 'hand-over':
      return (
        <HandOverSheet
          open
          title={`Hand ${charge.title} over`}
          confirm="Hand over"
          people={people}
          presentId={charge.person?.id ?? null}
          busy={acts.busy}
          problem={acts.problem}
          onClose={onClose}
          onChoose={acts.handOver}
        />
      );
    case 'off-since':
      return <OffSinceSheet {...common} now={now} onConfirm={acts.currentOff} />;
    case 'clip-on':
      return <ClipOnSheet {...common} now={now} onConfirm={acts.queue} />;
    default:
      return (
        <EndSheet
          {...common}
          kind={sheet}
          draft={endDraft.value}
          onDraft={endDraft.set}
          onConfirm={(text) => {
            if (sheet === 'fit') acts.fit(text);
            else if (sheet === 'shelve') acts.shelve(text);
            else acts.drop(onDropped);
          }}
        />
      );
  }
}
