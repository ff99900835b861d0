import { createEvent, fireEvent, render, screen } from '@testing-library/react';
import { describe, expect, it, vi } from 'vitest';
import { Link } from '@/shared/ui/primitives/link';
import type { NavItem } from '@/shared/ui/screen/nav-items';
import { SideRail } from '@/shared/ui/screen/side-rail';
import { TabBar } from '@/shared/ui/screen/tab-bar';

const items: NavItem[] = [
  { key: 'bench', title: 'Bench', icon: 'bench', href: '/bench' },
  { key: 'alerts', title: 'Alerts', icon: 'alerts', href: '/alerts', count: 2 },
];

function click(element: HTMLElement, init: object = {}) {
  const event = createEvent.click(element, init);
  fireEvent(element, event);
  return event.defaultPrevented;
}

describe.each([
  ['TabBar', TabBar],
  ['SideRail', SideRail],
])('%s', (_name, Bar) => {
  it('is a navigation of real links, the present one marked, open alerts read with the name', () => {
    render(<Bar items={items} current="bench" onGo={() => {}} />);
    expect(screen.getByRole('navigation', { name: 'Places' })).toBeTruthy();
    expect(screen.getByRole('link', { name: 'Bench' }).getAttribute('aria-current')).toBe('page');
    const alerts = screen.getByRole('link', { name: 'Alerts, 2 open' });
    expect([alerts.getAttribute('href'), alerts.getAttribute('aria-current')]).toEqual(['/alerts', null]);
  });

  it('goes inside the app on a plain press and leaves Ctrl to the browser', () => {
    const go = vi.fn();
    render(<Bar items={items} current="bench" onGo={go} />);
    const alerts = screen.getByRole('link', { name: 'Alerts, 2 open' });
    expect(click(alerts)).toBe(true);
    expect(go).toHaveBeenCalledExactlyOnceWith(items[1]);
    expect(click(alerts, { ctrlKey: true })).toBe(false);
    expect(go).toHaveBeenCalledTimes(1);
  });
});

describe('Link', () => {
  it('is a button without an address and a link with one', () => {
    const press = vi.fn();
    render(<Link title="Measure again" onPress={press} />);
    fireEvent.click(screen.getByRole('button', { name: 'Measure again' }));
    expect(press).toHaveBeenCalledTimes(1);
    render(<Link title="CSV" href="/api/waits.csv" />);
    const link = screen.getByRole('link', { name: 'CSV' });
    expect(link.getAttribute('href')).toBe('/api/waits.csv');
    expect(click(link)).toBe(false);
  });

  it('goes nowhere when disabled', () => {
    const press = vi.fn();
    render(<Link title="Hold" href="/hold" onPress={press} disabled />);
    const link = screen.getByRole('link', { name: 'Hold' });
    click(link);
    expect(press).not.toHaveBeenCalled();
    expect([link.getAttribute('href'), link.getAttribute('aria-disabled')]).toEqual([null, 'true']);
  });
});
