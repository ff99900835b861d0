import fs from 'node:fs';
import { describe, expect, it } from 'vitest';
import { placeOf, railItems, tabItems, titleOf } from '@/shared/ui/shell/places';

describe('places', () => {
  it('of the phone are four, with the open alerts counted', () => {
    expect(tabItems({ alerts: 2 }).map(({ title, count }) => `${title} ${count ?? ''}`.trim())).toEqual([
      'Bench',
      'Spares',
      'Alerts 2',
      'More',
    ]);
  });

  it('of the desk hold the waits only for those who may read them', () => {
    const keys = (seesWaits: boolean) => railItems({ alerts: 0, seesWaits }).map(({ key }) => key);
    expect(keys(true)).toEqual(['bench', 'spares', 'alerts', 'waits', 'workshop']);
    expect(keys(false)).toEqual(['bench', 'spares', 'alerts', 'workshop']);
  });

  it.each([
    ['/bench', 'bench', 'bench'],
    ['/spares', 'spares', 'spares'],
    ['/more', 'more', 'more'],
    ['/waits', 'more', 'waits'],
    ['/workshop', 'more', 'workshop'],
  ])('%s shows the bottom bar with %s', (path, tab, rail) => {
    expect(placeOf(path)).toEqual({ tab, rail });
  });

  it.each([
    ['/plan', 'bench'],
    ['/charges/c1', 'bench'],
    ['/charges/c1/checks', 'bench'],
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
