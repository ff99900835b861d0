import { useState } from 'react';
import { View } from 'react-native';
import { useFits } from '@/shared/client/bench-plan';
import { actProblem } from '@/shared/client/charge-acts';
import { useWaitingWrite, useWaitingWrites } from '@/shared/client/waiting/waiting';
import type { FreeStretchDto, MyDayDto } from '@/shared/contract/bench-plan';
import { Link } from '@/shared/ui/primitives/link';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { dayEntries, foldPast, type DayEntry } from '@/shared/ui/my-day/day-entries';
import { BreakRow, DayRow, FreeRow, HandRow, LookInRow, NowRow } from '@/shared/ui/my-day/day-rows';
import { FillCard } from '../work/fill-card';
import { FitList } from '../work/fit-list';

const most = { fitting: 4, beside: 1 } as const;

/** The day of one person in the order of time, with what can be done at each place of it. */
export function DayList({
  day,
  now,
  today,
  onGo,
  onStale,
}: {
  day: MyDayDto;
  now: number;
  /** 'YYYY-MM-DD' in the workshop's zone. */
  today: string;
  onGo: (path: string) => void;
  /** After an act: read the day again. */
  onStale: () => void;
}) {
  const toast = useToast();
  const lookIn = useWaitingWrite();
  const waiting = useWaitingWrites();
  const [refused, setRefused] = useState<{ chargeId: string; text: string } | null>(null);
  const fits = useFits(day.day >= today);
  const mine = fits.data?.people.find(({ person }) => person.id === day.person.id)?.stretches ?? [];
  const renew = () => {
    void fits.refetch();
    onStale();
  };
  const entries = dayEntries(day, now, today);
  const { over, rest } = foldPast(entries, now);
  const [unfolded, setUnfolded] = useState(false);
  const rowOf = (entry: DayEntry) => {
    switch (entry.kind) {
      case 'now':
        return <NowRow key={entry.key} at={entry.at} />;
      case 'break':
        return <BreakRow key={entry.key} entry={entry} now={now} />;
      case 'look-in':
        return (
          <LookInRow
            key={entry.key}
            lookIn={entry.lookIn}
            next={entry.next && day.day === today}
            now={now}
            busy={lookIn.isPending && lookIn.variables.chargeId === entry.lookIn.chargeId}
            waits={waiting.some(({ kind, chargeId }) => kind === 'look-in' && chargeId === entry.lookIn.chargeId)}
            problem={entry.next && refused?.chargeId === entry.lookIn.chargeId ? refused.text : null}
            onGo={onGo}
            onDone={() => {
              setRefused(null);
              lookIn.mutate(
                { kind: 'look-in', chargeId: entry.lookIn.chargeId, title: entry.lookIn.title, input: {} },
                {
                  onSuccess: (charge) =>
                    toast({
                      text:
                        charge === null
                          ? `Looked in at ${entry.lookIn.title}. It waits on this device for the connection.`
                          : `Looked in at ${entry.lookIn.title}.`,
                    }),
                  onError: (error) => setRefused({ chargeId: entry.lookIn.chargeId, text: actProblem(error) }),
                  onSettled: renew,
                },
              );
            }}
          />
        );
      case 'free': {
        const stretch = stretchAt(mine, entry.free);
        return (
          <FreeRow key={entry.key} entry={entry} now={now}>
            {stretch ? <FitList stretch={stretch} now={now} most={most} onStale={renew} /> : null}
          </FreeRow>
        );
      }
      case 'block':
        return entry.block.kind === 'fill' ? (
          <DayRow key={entry.key} at={entry.at} past={entry.to <= now && entry.block.stint?.state === 'done'}>
            <FillCard block={entry.block} now={now} onGo={onGo} onStale={renew} />
          </DayRow>
        ) : (
          <HandRow key={entry.key} block={entry.block} now={now} onGo={onGo} />
        );
    }
  };
  return (
    <View style={{ rowGap: 8 }}>
      {day.daysOff.map((off) => (
        <Txt key={off.day} bold>{`Day off${off.note ? `: ${off.note}` : ''}`}</Txt>
      ))}
      {day.present.length === 0 && day.daysOff.length === 0 ? (
        <Txt tone="ink2">By your working hours you are not here on this day.</Txt>
      ) : null}
      {day.present.length > 0 && entries.every(({ kind }) => kind === 'now' || kind === 'break') ? (
        <Txt tone="ink2">Nothing of the bench plan is left for you on this day.</Txt>
      ) : null}
      {over.length > 0 ? (
        <Link
          kind="small"
          title={unfolded ? 'Hide what is over' : `Show what is over: ${over.length}`}
          onPress={() => setUnfolded(!unfolded)}
        />
      ) : null}
      <View role="list" aria-label="My day">
        {(unfolded ? entries : rest).map(rowOf)}
      </View>
    </View>
  );
}

/** The free stretch of the fits that is the same as one of the day: both are cut by the clock at their own moment. */
const stretchAt = <S extends Pick<FreeStretchDto, 'from' | 'to'>>(
  stretches: readonly S[],
  { from, to }: FreeStretchDto,
) => stretches.find((one) => one.from < to && one.to > from);
