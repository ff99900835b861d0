import { useState } from 'react';
import { useDraft } from '@/shared/client/drafts';
import { useCorrectWait } from '@/shared/client/repairs';
import type { RepairDto, RepairWaitDto } from '@/shared/contract/repair';
import { useFormats } from '@/shared/ui/format/formats';
import { parseTimeOfDay, timeOfDayText } from '@/shared/ui/format/parse';
import { dayOf, daysBetween, instantOfDay, localTime } from '@/shared/ui/format/zone';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { DateTimeField, type DayAndTime } from '@/shared/ui/primitives/date-time-field';
import { Field } from '@/shared/ui/primitives/field';
import { SheetFields } from '@/shared/ui/primitives/sheet-fields';
import { Txt } from '@/shared/ui/primitives/txt';
import { problemOfAct } from './act-problem';

interface WaitDraft {
  from: DayAndTime;
  to: DayAndTime | null;
  reason: string;
}

const typed = (instant: string, zone: string): DayAndTime => {
  const at = Date.parse(instant);
  const { hour, minute } = localTime(at, zone);
  return { day: dayOf(at, zone), time: timeOfDayText(hour * 60 + minute) };
};

/** The instant that was typed; the one that stood there where it was not touched, to the second. */
function instantOfTyped(value: DayAndTime, before: string | null, zone: string): string | null {
  if (before !== null) {
    const was = typed(before, zone);
    if (was.day === value.day && was.time === value.time) return before;
  }
  const minutes = parseTimeOfDay(value.time);
  return minutes === null ? null : new Date(instantOfDay(value.day, minutes, zone)).toISOString();
}

/** Corrects when a repair began and ended to wait, with a reason. */
export function WaitSheet({
  repair,
  wait,
  now,
  onClose,
}: {
  repair: RepairDto;
  wait: RepairWaitDto;
  now: number;
  onClose: () => void;
}) {
  const { zone } = useFormats();
  const correct = useCorrectWait();
  const [initial] = useState<WaitDraft>(() => ({
    from: typed(wait.from, zone),
    to: wait.to === null ? null : typed(wait.to, zone),
    reason: '',
  }));
  const draft = useDraft(`repair.wait.${wait.id}`, initial);
  const { reason } = draft.value;
  const change = (next: Partial<WaitDraft>) => draft.set((last) => ({ ...last, ...next }));
  const today = dayOf(now, zone);
  const earliest = Math.min(-14, daysBetween(today, draft.value.from.day) - 14);
  const from = instantOfTyped(draft.value.from, wait.from, zone);
  const to = draft.value.to === null ? null : instantOfTyped(draft.value.to, wait.to, zone);
  const toMissing = draft.value.to !== null && to === null;
  const backwards = from !== null && to !== null && Date.parse(to) < Date.parse(from);
  const problem = problemOfAct(correct.error);
  return (
    <ConfirmSheet
      open
      title="Correct the wait"
      fact="The time in which the repair could do nothing but wait for its module. What stood before stays in the log."
      confirm="Correct it"
      safe="Leave it"
      ready={from !== null && !toMissing && !backwards && reason.trim() !== ''}
      why={
        from === null || toMissing
          ? 'Type both times like 14:05 first.'
          : backwards
            ? 'It ends before it begins.'
            : 'Say why first.'
      }
      busy={correct.isPending}
      onConfirm={() =>
        from !== null &&
        correct.mutate(
          { id: repair.id, rev: repair.rev, waitId: wait.id, from, to, reason: reason.trim() },
          {
            onSuccess: () => {
              draft.clear();
              onClose();
            },
          },
        )
      }
      onClose={onClose}
    >
      <SheetFields under>
        <DateTimeField
          label="From"
          dayLabel="Day it began"
          value={draft.value.from}
          onChange={(value) => change({ from: value })}
          today={today}
          from={earliest}
          to={0}
        />
        {draft.value.to === null ? (
          <Txt tone="ink2">It waits still. It ends by itself when its charge is ready.</Txt>
        ) : (
          <DateTimeField
            label="To"
            dayLabel="Day it ended"
            value={draft.value.to}
            onChange={(value) => change({ to: value })}
            today={today}
            from={earliest}
            to={0}
            error={backwards ? 'It ends before it begins.' : undefined}
          />
        )}
        <Field
          label="Reason"
          value={reason}
          multiline
          lines={2}
          maxLength={300}
          onChangeText={(text) => change({ reason: text })}
        />
        {problem ? (
          <Txt tone="alarm" bold role="alert">
            {problem}
          </Txt>
        ) : null}
      </SheetFields>
    </ConfirmSheet>
  );
}
