import type { IconName } from '../icons/icon-paths';

/** One place to go to. The app passes them in with the role's own choice. */
export interface NavItem {
  key: string;
  title: string;
  icon: IconName;
  href: string;
  /** Open alerts: a badge, and 'Alerts, 2' for readers. */
  count?: number;
}

export interface NavProps {
  items: readonly NavItem[];
  current: string;
  onGo: (item: NavItem) => void;
}

/** What a screen reader hears of an item. */
export const navLabel = ({ title, count }: NavItem): string => (count ? `${title}, ${count} open` : title);

interface LinkClick {
  preventDefault(): void;
  metaKey?: boolean;
  ctrlKey?: boolean;
  shiftKey?: boolean;
}

/** A tap goes inside the app; with Ctrl, Shift or the command key the browser opens its own tab. */
export const goInside = (go: () => void) => (event: LinkClick) => {
  if (event.metaKey || event.ctrlKey || event.shiftKey) return;
  event.preventDefault();
  go();
};
