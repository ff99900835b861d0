/** Where one can go: the bottom bar of the phone, the rail of tablet and desk. */
import type { NavItem } from '../screen/nav-items';

export interface Place {
  /** Key in the bottom bar; null inside a task, whose foot replaces the bar. */
  tab: 'bench' | 'repairs' | 'spares' | 'alerts' | 'more' | null;
  rail: 'bench' | 'bench-plan' | 'repairs' | 'spares' | 'alerts' | 'waits' | 'workshop' | 'more';
}

/** Screens that show the bottom bar. Everything else is a task with Back at its head and its next step at its foot. */
const tabs: Readonly<Record<string, Place['tab']>> = {
  '/bench': 'bench',
  '/repairs': 'repairs',
  '/spares': 'spares',
  '/alerts': 'alerts',
  '/more': 'more',
  '/bench-plan': 'more',
  '/my-day': 'bench',
  '/work': 'more',
  '/waits': 'more',
  '/workshop': 'more',
};

/** Which place of bar and rail an address belongs to. */
export function placeOf(path: string): Place {
  const bare = path.replace(/\/+$/, '') || '/';
  const first = bare.split('/')[1] ?? '';
  const rail =
    (['bench-plan', 'repairs', 'spares', 'alerts', 'waits', 'workshop', 'more'] as const).find(
      (key) => key === (['me', 'work', 'demo'].includes(first) ? 'more' : first),
    ) ?? 'bench';
  return { tab: tabs[bare] ?? null, rail };
}

const bench: NavItem = { key: 'bench', title: 'Bench', icon: 'bench', href: '/bench' };
const repairsWith = (count: number): NavItem => ({
  key: 'repairs',
  title: 'Repairs',
  icon: 'repairs',
  href: '/repairs',
  count,
  counted: count === 1 ? 'needs somebody' : 'need somebody',
});
const spares: NavItem = { key: 'spares', title: 'Spares', icon: 'spares', href: '/spares' };
const alertsWith = (count: number): NavItem => ({
  key: 'alerts',
  title: 'Alerts',
  icon: 'alerts',
  href: '/alerts',
  count,
});

/** What is counted at the places: open alerts, and repairs that need somebody. */
export interface PlaceCounts {
  alerts: number;
  repairs: number;
}

/** The phone's places. */
export const tabItems = ({ alerts, repairs }: PlaceCounts): NavItem[] => [
  bench,
  repairsWith(repairs),
  spares,
  alertsWith(alerts),
  { key: 'more', title: 'More', icon: 'more', href: '/more' },
];

/** The places of tablet and desk; the plan and the waits only for those who may. */
export const railItems = ({
  alerts,
  repairs,
  plansBench,
  seesWaits,
}: PlaceCounts & { plansBench: boolean; seesWaits: boolean }): NavItem[] => [
  bench,
  ...(plansBench
    ? ([{ key: 'bench-plan', title: 'Bench plan', icon: 'plan', href: '/bench-plan' }] satisfies NavItem[])
    : []),
  repairsWith(repairs),
  spares,
  alertsWith(alerts),
  ...(seesWaits ? ([{ key: 'waits', title: 'Waits', icon: 'waits', href: '/waits' }] satisfies NavItem[]) : []),
  { key: 'workshop', title: 'Workshop', icon: 'workshop', href: '/workshop' },
];

/** Titles of the browser's tab, by the route's file without its group. */
const titles: Readonly<Record<string, string>> = {
  'sign-in': 'Sign in',
  create: 'Create a workshop',
  join: 'Join a workshop',
  estimate: 'Quick estimate',
  wall: 'Wall',
  approve: 'Approve a wall',
  '+not-found': 'Not here',
  bench: 'Bench',
  'bench-plan': 'Bench plan',
  plan: 'Plan a charge',
  'my-day': 'My day',
  'work/index': 'Other work',
  'work/new': 'Add other work',
  'work/[id]': 'Other work',
  'work/[id]/index': 'Other work',
  'work/[id]/edit': 'Change other work',
  more: 'More',
  'me/index': 'Name and password',
  'me/alerts': 'Alerts and where they go',
  'me/weekly-digest': 'Weekly letter',
  'demo/mailbox': 'Mailbox of the demo',
  waiting: 'Waiting on this device',
  alerts: 'Alerts',
  waits: 'Waits',
  'waits/charges': 'Charges behind the waits',
  'repairs/index': 'Repairs',
  'repairs/new': 'Start a repair',
  'repairs/[id]': 'Repair',
  'repairs/[id]/index': 'Repair',
  'repairs/[id]/edit': 'Change a repair',
  'repairs/[id]/reading': 'Read a pack',
  'repairs/[id]/second-source': 'Second source',
  'repairs/[id]/target': 'Target',
  'repairs/[id]/spares': 'Choose a spare',
  'repairs/[id]/prove': 'Prove a repair',
  'spares/index': 'Spares',
  'spares/new': 'New spare',
  'spares/[id]': 'Spare',
  'spares/[id]/index': 'Spare',
  'spares/[id]/edit': 'Edit a spare',
  'spares/[id]/reading': 'Read a spare',
  'workshop/index': 'Workshop',
  'workshop/limits': 'Limits',
  'workshop/hours': 'Name and hours',
  'workshop/people/[id]': 'Person',
  'workshop/staffing/[id]': 'Hours of a person',
  'workshop/skills/[id]': 'Skill',
  'workshop/places/[id]': 'Place',
  'workshop/chargers/[id]': 'Charger',
  'workshop/module-types/[id]': 'Module type',
  'workshop/pack-types/[id]': 'Pack type',
  'workshop/meters/[id]': 'Meter',
  'workshop/resistors/[id]': 'Levelling resistor',
  'charges/[id]/index': 'Charge',
  'charges/[id]/checks': 'Before clipping on',
  'charges/[id]/log': 'Log a reading',
  'charges/[id]/log-file': 'Add a logger’s file',
  'charges/[id]/check': 'Check after rest',
  'charges/[id]/label': 'Label',
};

/** The title of the browser's tab. @param segments the route, as the router names it: '(workshop)', 'charges', '[id]' */
export function titleOf(segments: readonly string[]): string {
  const route = segments.filter((segment) => !segment.startsWith('(')).join('/');
  const title = titles[route] ?? titles[`${route}/index`];
  return title ? `${title} · Bidewell` : 'Bidewell';
}
