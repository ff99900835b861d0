import { useState, type ReactNode } from 'react';
import { View } from 'react-native';
import { useLink } from '@/shared/client/link';
import { useCan, useMember } from '@/shared/client/session';
import { useStaffing } from '@/shared/client/staffing';
import { newStint, useWorkActs } from '@/shared/client/work-acts';
import type { StintDto, WorkDto } from '@/shared/contract/work';
import { useFormats } from '@/shared/ui/format/formats';
import { clock } from '@/shared/ui/format/clock';
import { Button } from '@/shared/ui/primitives/button';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { ButtonRow, Foot } from '@/shared/ui/screen/foot';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import { DoneSheet } from '@/shared/ui/work/done-sheet';
import { StintRows } from '@/shared/ui/work/stint-rows';
import { TakeSheet } from '@/shared/ui/work/take-sheet';
import { WorkFacts } from '@/shared/ui/work/work-facts';
import { inHand, isOver, whoHasIt, workTitle } from '@/shared/ui/work/work-words';
import { ReasonSheet } from '../repair/reason-sheet';

type Sheet = { kind: 'take' | 'give' | 'drop' } | { kind: 'done'; stint: StintDto };

/** One piece of other work: what it takes, who has it, and what can be done with it now. */
export function WorkPage({
  work,
  now,
  onBack,
  onGo,
  onStale,
}: {
  work: WorkDto;
  now: number;
  onBack: () => void;
  onGo: (path: string) => void;
  /** After a refusal: read it again. */
  onStale: () => void;
}) {
  const { zone, marks } = useFormats();
  const toast = useToast();
  const wide = useBreakpoint() === 'wide';
  const offline = useLink().state === 'down';
  const me = useMember().person.id;
  const plans = useCan('bench:plan');
  const mayWrite = useCan('work:write');
  const people = useStaffing().data?.people ?? [];
  const acts = useWorkActs(onStale);
  const [sheet, setSheet] = useState<Sheet | null>(null);
  const open = (next: Sheet | null) => {
    acts.forget();
    setSheet(next);
  };
  const close = () => open(null);
  const over = isOver(work);
  const own = inHand(work.stints).find(({ person }) => person.id === me) ?? null;
  const some = work.leftLongMinutes > 0 && !over;
  const begun = work.stints.some(({ state }) => state === 'begun');
  const problem = acts.refused?.text ?? null;
  const taken = (after: WorkDto) => {
    close();
    const stint = newStint(work, after);
    toast({
      text: stint ? `${after.title} is ${stint.person.id === me ? 'yours' : `with ${stint.person.name}`}.` : 'Taken.',
      ...(stint ? { action: { title: 'Give it back', onPress: () => acts.giveBack(work.id, stint.id) } } : {}),
    });
  };
  const stintActs = (stint: StintDto): ReactNode => {
    const may = mayWrite && !over && (stint.person.id === me || plans);
    if (!may || (stint.state !== 'taken' && stint.state !== 'begun')) return null;
    // The own one's next step stands in the foot.
    const first = stint.id === own?.id;
    return (
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: 8, marginTop: 6 }}>
        {stint.state === 'taken' && !first ? (
          <Button
            look="line"
            size="small"
            title="Begin"
            label={`Begin, for ${stint.person.name}`}
            disabled={offline || acts.busy}
            onPress={() => acts.begin(work.id, stint.id)}
          />
        ) : null}
        {stint.state === 'begun' && !first ? (
          <Button
            look="line"
            size="small"
            title="Done"
            label={`Done, for ${stint.person.name}`}
            disabled={offline || acts.busy}
            onPress={() => open({ kind: 'done', stint })}
          />
        ) : null}
        <Button
          look="line"
          size="small"
          title="Give back"
          label={first ? 'Give back' : `Give back, for ${stint.person.name}`}
          disabled={offline || acts.busy}
          onPress={() => acts.giveBack(work.id, stint.id)}
        />
      </View>
    );
  };
  const next = own ? (
    own.state === 'begun' ? (
      <Button
        grow
        title="Done"
        disabled={offline}
        busy={acts.busy}
        onPress={() => open({ kind: 'done', stint: own })}
      />
    ) : (
      <Button grow title="Begin" disabled={offline} busy={acts.busy} onPress={() => acts.begin(work.id, own.id)} />
    )
  ) : over ? (
    <Button grow title="Open it again" disabled={offline} busy={acts.busy} onPress={() => acts.reopen(work.id)} />
  ) : some ? (
    <Button grow title="Take it" disabled={offline} busy={acts.busy} onPress={() => open({ kind: 'take' })} />
  ) : null;
  const give =
    plans && some ? (
      <Button look="line" grow title="Give it to…" disabled={offline} onPress={() => open({ kind: 'give' })} />
    ) : null;
  const note = offline ? 'No connection: what is done with it waits until it is back.' : sheet ? null : problem;
  return (
    <Screen
      single
      header={
        <HeaderBar
          title={workTitle(work)}
          sub={[work.number, whoHasIt(work)].join(' · ')}
          onBack={onBack}
          clock={wide ? clock(now, zone, marks) : undefined}
        />
      }
      foot={
        mayWrite && (next || give) ? (
          <Foot
            note={
              note && !offline ? (
                <Txt tone="alarm" bold role="alert">
                  {note}
                </Txt>
              ) : (
                note
              )
            }
          >
            <ButtonRow>
              {give}
              {next}
            </ButtonRow>
          </Foot>
        ) : undefined
      }
    >
      <View style={{ rowGap: 24, paddingBottom: 16 }}>
        <WorkFacts work={work} now={now} onGo={onGo} />
        {work.stints.length > 0 ? (
          <View style={{ rowGap: 6 }}>
            <Txt kind="heading" heading={2}>
              Who does it
            </Txt>
            <StintRows stints={work.stints} now={now} actsOf={stintActs} />
          </View>
        ) : null}
        {mayWrite && !over ? (
          <View style={{ rowGap: 8 }}>
            {own && some ? (
              <Button look="line" title="Take what is left" disabled={offline} onPress={() => open({ kind: 'take' })} />
            ) : null}
            <Button look="line" title="Change it" onPress={() => onGo(`/work/${work.id}/edit`)} />
            <Button
              look="line"
              title="Drop it"
              disabled={offline || begun}
              describedBy={begun ? 'drop-why' : undefined}
              onPress={() => open({ kind: 'drop' })}
            />
            {begun ? (
              <Txt kind="small" tone="ink2" nativeID="drop-why">
                Somebody is at it. It can be dropped once that is ended or given back.
              </Txt>
            ) : null}
          </View>
        ) : null}
      </View>
      {sheet?.kind === 'take' || sheet?.kind === 'give' ? (
        <TakeSheet
          work={work}
          takers={
            sheet.kind === 'give'
              ? people
                  .filter(({ person }) => person.id !== me)
                  .map(({ person, skillIds }) => ({
                    ...person,
                    able: work.skill === null || skillIds.includes(work.skill.id),
                  }))
              : null
          }
          now={now}
          busy={acts.busy}
          problem={problem}
          onClose={close}
          onTake={(input) => acts.take(work.id, input, taken)}
        />
      ) : null}
      {sheet?.kind === 'done' ? (
        <DoneSheet
          title={workTitle(work)}
          busy={acts.busy}
          problem={problem}
          onClose={close}
          onEnd={(minutesLeft) => acts.end(work.id, sheet.stint.id, minutesLeft, close)}
        />
      ) : null}
      {sheet?.kind === 'drop' ? (
        <ReasonSheet
          title={`Drop ${work.title}?`}
          fact="It is no longer offered, and whoever has taken it has it no longer. It can be opened again."
          confirm="Drop it"
          safe="Keep it"
          draft={`work.drop.${work.id}`}
          busy={acts.busy}
          error={acts.refused?.error ?? null}
          onConfirm={(reason, done) => acts.drop(work.id, reason, done)}
          onClose={close}
        />
      ) : null}
    </Screen>
  );
}
