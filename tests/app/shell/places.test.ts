import fs from 'node:fs';
import { describe, expect, it } from 'vitest';
import { navLabel } from '@/shared/ui/screen/nav-items';
import { placeOf, railItems, tabItems, titleOf } from '@/shared/ui/shell/places';

describe('places', () => {
  it('of the phone are five, with the open alerts and the repairs that need somebody counted', () => {
    expect(tabItems({ alerts: 2, repairs: 3 }).map(({ title, count }) => `${title} ${count ?? ''}`.trim())).toEqual([
      'Bench',
      'Repairs 3',
      'Spares',
      'Alerts 2',
      'More',
    ]);
  });

  it('of the desk hold the bench plan and the waits only for those who may', () => {
    const keys = (may: boolean) =>
      railItems({ alerts: 0, repairs: 0, plansBench: may, seesWaits: may }).map(({ key }) => key);
    expect(keys(true)).toEqual(['bench', 'bench-plan', 'repairs', 'spares', 'alerts', 'waits', 'workshop']);
    expect(keys(false)).toEqual(['bench', 'repairs', 'spares', 'alerts', 'workshop']);
  });

  it('tell a reader what is counted: 1 that needs, 3 that need somebody, 2 open alerts', () => {
    const heard = (repairs: number) => tabItems({ alerts: 2, repairs }).map(navLabel);
    expect(heard(3)).toEqual(['Bench', 'Repairs, 3 need somebody', 'Spares', 'Alerts, 2 open', 'More']);
    expect(heard(1)[1]).toBe('Repairs, 1 needs somebody');
    expect(heard(0)[1]).toBe('Repairs');
  });

  it.each([
    ['/bench', 'bench', 'bench'],
    ['/repairs', 'repairs', 'repairs'],
    ['/spares', 'spares', 'spares'],
    ['/more', 'more', 'more'],
    ['/bench-plan', 'more', 'bench-plan'],
    ['/waits', 'more', 'waits'],
    ['/workshop', 'more', 'workshop'],
  ])('%s shows the bottom bar with %s', (path, tab, rail) => {
    expect(placeOf(path)).toEqual({ tab, rail });
  });

  it.each([
    ['/plan', 'bench'],
    ['/charges/c1', 'bench'],
    ['/charges/c1/checks', 'bench'],
    ['/repairs/r1', 'repairs'],
    ['/repairs/r1/reading', 'repairs'],
    ['/spares/s1', 'spares'],
    ['/spares/new', 'spares'],
    ['/workshop/module-types', 'workshop'],
    ['/me', 'more'],
  ])('%s is a task: no bottom bar, %s in the rail', (path, rail) => {
    expect(placeOf(path)).toEqual({ tab: null, rail });
  });
});

describe('the title of the tab', () => {
  it.each([
    [['sign-in'], 'Sign in · Bidewell'],
    [['(workshop)', 'bench'], 'Bench · Bidewell'],
    [['(workshop)', 'charges', '[id]'], 'Charge · Bidewell'],
    [['(workshop)', 'charges', '[id]', 'checks'], 'Before clipping on · Bidewell'],
    [[], 'Bidewell'],
  ])('of %j is %s', (segments, title) => expect(titleOf(segments)).toBe(title));

  // A page without a title of its own is found by nobody in a history (WCAG 2.4.2).
  it('is there for every route file', () => {
    const files = fs.readdirSync('app', { recursive: true, encoding: 'utf8' }).filter((name) => name.endsWith('.tsx'));
    const untitled = files
      .map((name) => name.replace(/\.tsx$/, ''))
      .filter((route) => !route.endsWith('_layout') && route !== 'index')
      .filter((route) => titleOf(route.replace(/\/index$/, '').split('/')) === 'Bidewell');
    expect(untitled).toEqual([]);
  });
});
