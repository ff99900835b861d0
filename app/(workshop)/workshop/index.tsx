/* eslint-disable max-lines -- to be split: hooks and parts need a place that may import both shared/client and shared/ui */
import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState, type ReactNode } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useChargers } from '@/shared/client/chargers';
import { useNow } from '@/shared/client/clock';
import { useContractForm } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { useMeters } from '@/shared/client/meters';
import { useModuleTypes } from '@/shared/client/module-types';
import { partState } from '@/shared/client/part-state';
import { useInvitations, useInvite, usePeople, useRecallInvitation } from '@/shared/client/people';
import { useResistors } from '@/shared/client/resistors';
import { useMember } from '@/shared/client/session';
import { useRevokeWall, useWalls } from '@/shared/client/walls';
import { useWorkshop } from '@/shared/client/workshop';
import { inviteSchema, type InvitationDto, type OneUseLinkDto } from '@/shared/contract/people';
import type { WallDto } from '@/shared/contract/wall';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { MoreRow } from '@/shared/ui/more/more-row';
import { Button } from '@/shared/ui/primitives/button';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { Link } from '@/shared/ui/primitives/link';
import { Rule } from '@/shared/ui/primitives/rule';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import { ChargersTable } from '@/shared/ui/workshop/chargers-table';
import { InviteFields, type InviteTexts } from '@/shared/ui/workshop/invite-fields';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { oldChecks } from '@/shared/ui/workshop/meter-age';
import { OneUseLink } from '@/shared/ui/workshop/one-use-link';
import { PeopleTable } from '@/shared/ui/workshop/people-table';
import { useScrollToPart } from '@/shared/ui/workshop/scroll-to-part';
import { SectionBlock } from '@/shared/ui/workshop/section-block';
import { SectionList } from '@/shared/ui/workshop/section-list';
import { isSection, sections, type SectionKey } from '@/shared/ui/workshop/sections';
import { HourFacts, LimitFacts } from '@/shared/ui/workshop/settings-facts';
import { MetersTable, ResistorsTable } from '@/shared/ui/workshop/small-tables';
import { TypesTable } from '@/shared/ui/workshop/types-table';
import { WallRows } from '@/shared/ui/workshop/wall-rows';
import { WorkshopColumns } from '@/shared/ui/workshop/workshop-columns';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** The workshop's settings: all parts on one page on the desk, a row into each of them on the phone. */
export default function Workshop() {
  const router = useRouter();
  const wide = useBreakpoint() === 'wide';
  const { section: asked } = useLocalSearchParams<{ section?: string }>();
  const section = isSection(asked) ? asked : null;
  const { workshop } = useMember();
  const { zone, marks } = useFormats();
  const time = clock(useNow(60_000), zone, marks);
  const sub = useCounts(workshop.name);
  useScrollToPart(section, wide);
  if (wide) return <Desk section={section} sub={sub} time={time} />;
  if (section === null)
    return (
      <Screen header={<HeaderBar title="Workshop" sub={sub} clock={time} />}>
        {sections.map(({ key, title, meaning }) => (
          <MoreRow
            key={key}
            title={title}
            meaning={meaning}
            href={`/workshop?section=${key}`}
            onPress={() => router.push(`/workshop?section=${key}` as Href)}
          />
        ))}
      </Screen>
    );
  const Part = parts[section];
  return (
    <Screen
      header={
        <HeaderBar
          title={sections.find(({ key }) => key === section)?.title ?? 'Workshop'}
          sub={workshop.name}
          onBack={() => (router.canGoBack() ? router.back() : router.replace('/workshop' as Href))}
          clock={time}
        />
      }
    >
      <Part titled={false} />
      {section === 'people' ? <Invite rule /> : null}
    </Screen>
  );
}

function Desk({ section, sub, time }: { section: SectionKey | null; sub: string; time: string }) {
  const router = useRouter();
  const mayInvite = useGate('people:write').may;
  const mayApprove = useGate('wall:approve').may;
  return (
    <Screen header={<HeaderBar title="Workshop" sub={sub} clock={time} />}>
      <WorkshopColumns
        nav={
          <SectionList
            current={section ?? 'people'}
            onGo={(key) => router.replace(`/workshop?section=${key}` as Href)}
          />
        }
        work={sections
          .filter(({ key }) => key !== 'walls' || !mayApprove)
          .map(({ key }) => {
            const Part = parts[key];
            return <Part key={key} titled />;
          })}
        side={
          mayInvite || mayApprove ? (
            <>
              {mayInvite ? <Invite /> : null}
              {mayInvite && mayApprove ? <Rule gap={0} /> : null}
              {mayApprove ? <Walls titled /> : null}
            </>
          ) : null
        }
      />
    </Screen>
  );
}

/** 'Harbour Lane Traction · 6 people, 6 channels, 4 module types' */
function useCounts(name: string): string {
  const people = usePeople().data?.filter((person) => !person.disabled).length;
  const channels = useChargers()
    .data?.filter((charger) => !charger.retired)
    .reduce((sum, charger) => sum + charger.channels.length, 0);
  const types = useModuleTypes().data?.length;
  const counted = (count: number | undefined, one: string, many: string) =>
    count === undefined ? [] : [`${count} ${count === 1 ? one : many}`];
  const counts = [
    ...counted(people, 'person', 'people'),
    ...counted(channels, 'channel', 'channels'),
    ...counted(types, 'module type', 'module types'),
  ].join(', ');
  return counts ? `${name} · ${counts}` : name;
}

interface PartProps {
  /** The header says it already on the phone. */
  titled: boolean;
}

const parts: Record<SectionKey, (props: PartProps) => ReactNode> = {
  people: People,
  chargers: Chargers,
  'module-types': ModuleTypes,
  meters: Meters,
  resistors: Resistors,
  limits: Limits,
  hours: Hours,
  walls: Walls,
};

function useGo() {
  const router = useRouter();
  return (href: string) => router.push(href as Href);
}

function Add({ title, href, may }: { title: string; href: string; may: boolean }) {
  const go = useGo();
  return may ? <Link kind="small" align="right" title={title} href={href} onPress={() => go(href)} /> : null;
}

const Nothing = ({ words }: { words: string }) => <Txt tone="ink2">{words}</Txt>;

function People({ titled }: PartProps) {
  const go = useGo();
  const toast = useToast();
  const now = useNow(30_000);
  const gate = useGate('people:write');
  const people = usePeople();
  const invitations = useInvitations(gate.may);
  const recall = useRecallInvitation();
  const [asked, setAsked] = useState<InvitationDto | null>(null);
  const retry = () => {
    void people.refetch();
    if (gate.may) void invitations.refetch();
  };
  return (
    <SectionBlock
      id="people"
      title="People and roles"
      titled={titled}
      aside={
        titled ? (
          <Txt kind="small" tone="ink2">
            the role decides what a person may do
          </Txt>
        ) : undefined
      }
      state={gate.may ? partState(people, invitations) : partState(people)}
      what="the people"
      onRetry={retry}
      note={whoMay(gate)}
    >
      <PeopleTable
        people={people.data ?? []}
        invitations={invitations.data ?? []}
        now={now}
        mayChange={gate.may}
        onEdit={(person) => go(`/workshop/people/${person.id}`)}
        onRecall={setAsked}
      />
      <ProblemLine text={recall.error ? sentenceOf(recall.error) : null} />
      <ConfirmSheet
        open={asked !== null}
        title="Recall the invitation?"
        fact={asked ? `The link for ${asked.email} stops working.` : undefined}
        confirm="Recall it"
        safe="Leave it"
        busy={recall.isPending}
        onClose={() => setAsked(null)}
        onConfirm={() => {
          if (asked)
            recall.mutate(asked.id, {
              onSuccess: () => toast({ text: `The invitation of ${asked.email} is recalled.` }),
              onSettled: () => setAsked(null),
            });
        }}
      />
    </SectionBlock>
  );
}

function Invite({ rule = false }: { rule?: boolean }) {
  const may = useGate('people:write').may;
  const now = useNow(60_000);
  const invite = useInvite();
  const [made, setMade] = useState<{ link: OneUseLinkDto; email: string } | null>(null);
  const empty: InviteTexts = { email: '', role: 'technician' };
  const f = useContractForm({
    schema: inviteSchema,
    initial: empty,
    draft: 'invite',
    send: async (output) => {
      setMade({ link: await invite.mutateAsync(output), email: output.email });
      f.clear(empty);
    },
  });
  if (!may) return null;
  return (
    <View style={{ rowGap: 16 }}>
      {rule ? <Rule gap={8} /> : null}
      {made ? <OneUseLink key={made.link.url} link={made.link} forWhom={made.email} now={now} /> : null}
      <InviteFields form={f.form} busy={f.busy} problem={f.problem} onSend={() => void f.submit()} />
    </View>
  );
}

function Chargers({ titled }: PartProps) {
  const go = useGo();
  const now = useNow(60_000);
  const gate = useGate('equipment:write');
  const chargers = useChargers();
  const meters = useMeters();
  const own = (chargers.data ?? []).filter((charger) => !charger.retired);
  const retired = (chargers.data ?? []).filter((charger) => charger.retired);
  const named = (meters.data ?? []).filter((meter) => own.some((charger) => charger.meterId === meter.id));
  return (
    <SectionBlock
      id="chargers"
      title="Chargers and channels"
      titled={titled}
      aside={<Add title="add a charger" href="/workshop/chargers/new" may={gate.may} />}
      state={partState(chargers, meters)}
      what="the chargers"
      onRetry={() => {
        void chargers.refetch();
        void meters.refetch();
      }}
      note={whoMay(gate)}
    >
      {own.length === 0 ? (
        <Nothing words="No charger yet. Nothing can be planned without one." />
      ) : (
        <ChargersTable
          chargers={own}
          meters={meters.data ?? []}
          now={now}
          mayChange={gate.may}
          onEdit={(charger) => go(`/workshop/chargers/${charger.id}`)}
        />
      )}
      <OldChecks words={oldChecks(named, now)} />
      {retired.length > 0 ? (
        <View style={{ flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', columnGap: 12 }}>
          <Txt kind="small" tone="ink2">
            Out of service:
          </Txt>
          {retired.map((charger) => (
            <Link
              key={charger.id}
              kind="small"
              title={charger.name}
              href={`/workshop/chargers/${charger.id}`}
              onPress={() => go(`/workshop/chargers/${charger.id}`)}
            />
          ))}
        </View>
      ) : null}
    </SectionBlock>
  );
}

function OldChecks({ words }: { words: string | null }) {
  return words ? (
    <Txt kind="small" tone="ink2">
      {words}
    </Txt>
  ) : null;
}

function ModuleTypes({ titled }: PartProps) {
  const go = useGo();
  const gate = useGate('equipment:write');
  const types = useModuleTypes();
  return (
    <SectionBlock
      id="module-types"
      title="Module types"
      titled={titled}
      aside={<Add title="add a type" href="/workshop/module-types/new" may={gate.may} />}
      state={partState(types)}
      what="the module types"
      onRetry={() => void types.refetch()}
      note={whoMay(gate)}
    >
      {types.data?.length === 0 ? (
        <Nothing words="No module type yet. Every spare is of one." />
      ) : (
        <TypesTable types={types.data ?? []} onOpen={(type) => go(`/workshop/module-types/${type.id}`)} />
      )}
    </SectionBlock>
  );
}

function Meters({ titled }: PartProps) {
  const go = useGo();
  const now = useNow(60_000);
  const gate = useGate('equipment:write');
  const meters = useMeters();
  return (
    <SectionBlock
      id="meters"
      title="Meters"
      titled={titled}
      aside={<Add title="add a meter" href="/workshop/meters/new" may={gate.may} />}
      state={partState(meters)}
      what="the meters"
      onRetry={() => void meters.refetch()}
      note={whoMay(gate)}
    >
      {meters.data?.length === 0 ? (
        <Nothing words="No meter yet. Readings without one widen the band." />
      ) : (
        <MetersTable
          meters={meters.data ?? []}
          now={now}
          mayChange={gate.may}
          onEdit={(meter) => go(`/workshop/meters/${meter.id}`)}
        />
      )}
      <OldChecks words={oldChecks(meters.data ?? [], now)} />
    </SectionBlock>
  );
}

function Resistors({ titled }: PartProps) {
  const go = useGo();
  const gate = useGate('equipment:write');
  const resistors = useResistors();
  return (
    <SectionBlock
      id="resistors"
      title="Levelling resistors"
      titled={titled}
      aside={<Add title="add a resistor" href="/workshop/resistors/new" may={gate.may} />}
      state={partState(resistors)}
      what="the resistors"
      onRetry={() => void resistors.refetch()}
      note={whoMay(gate)}
    >
      {resistors.data?.length === 0 ? (
        <Nothing words="No levelling resistor yet. Unequal groups are brought level by charging alone." />
      ) : (
        <ResistorsTable
          resistors={resistors.data ?? []}
          mayChange={gate.may}
          onEdit={(resistor) => go(`/workshop/resistors/${resistor.id}`)}
        />
      )}
    </SectionBlock>
  );
}

function Limits({ titled }: PartProps) {
  const gate = useGate('workshop:write');
  const workshop = useWorkshop();
  return (
    <SectionBlock
      id="limits"
      title="Limits"
      titled={titled}
      aside={<Add title="change the limits" href="/workshop/limits" may={gate.may} />}
      state={partState(workshop)}
      what="the limits"
      onRetry={() => void workshop.refetch()}
      note={whoMay(gate)}
    >
      {workshop.data ? <LimitFacts workshop={workshop.data} /> : null}
    </SectionBlock>
  );
}

function Hours({ titled }: PartProps) {
  const gate = useGate('workshop:write');
  const workshop = useWorkshop();
  return (
    <SectionBlock
      id="hours"
      title="Name and hours"
      titled={titled}
      aside={<Add title="change name and hours" href="/workshop/hours" may={gate.may} />}
      state={partState(workshop)}
      what="name and hours"
      onRetry={() => void workshop.refetch()}
      note={whoMay(gate)}
    >
      {workshop.data ? <HourFacts workshop={workshop.data} /> : null}
    </SectionBlock>
  );
}

function Walls({ titled }: PartProps) {
  const gate = useGate('wall:approve');
  return gate.may ? (
    <WallList titled={titled} />
  ) : (
    <SectionBlock id="walls" title="Walls" titled={titled} state="ready" what="the walls" onRetry={() => {}}>
      {titled ? (
        <Txt tone="ink2">{whoMay(gate, 'Approved and taken back')}</Txt>
      ) : (
        <Forbidden what="Walls are approved and taken back" roles={gate.roles} people={gate.people} />
      )}
    </SectionBlock>
  );
}

function WallList({ titled }: PartProps) {
  const go = useGo();
  const toast = useToast();
  const now = useNow(30_000);
  const walls = useWalls();
  const revoke = useRevokeWall();
  const mayRevoke = useGate('wall:revoke').may;
  const [asked, setAsked] = useState<WallDto | null>(null);
  return (
    <SectionBlock
      id="walls"
      title="Walls"
      titled={titled}
      state={partState(walls)}
      what="the walls"
      onRetry={() => void walls.refetch()}
    >
      {walls.data?.length === 0 ? (
        <Nothing words="No screen shows the board yet. Open /wall on one: it shows a code." />
      ) : (
        <WallRows walls={walls.data ?? []} now={now} mayTakeBack={mayRevoke} onTakeBack={setAsked} />
      )}
      <ProblemLine text={revoke.error ? sentenceOf(revoke.error) : null} />
      <Button
        look="line"
        title={walls.data?.length ? 'Approve another wall' : 'Approve a wall'}
        onPress={() => go('/approve')}
      />
      <ConfirmSheet
        open={asked !== null}
        title={`Take back ${asked?.name ?? ''}?`}
        fact="The screen stops showing the board at once, and shows a code again."
        confirm="Take it back"
        safe="Leave it"
        busy={revoke.isPending}
        onClose={() => setAsked(null)}
        onConfirm={() => {
          if (asked)
            revoke.mutate(asked.id, {
              onSuccess: () => toast({ text: `${asked.name} no longer shows the board.` }),
              onSettled: () => setAsked(null),
            });
        }}
      />
    </SectionBlock>
  );
}
