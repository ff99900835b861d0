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
