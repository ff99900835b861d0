import type { IconName } from '../icons/icon-paths';

/** One place to go to. The app passes them in with the role's own choice. */
export interface NavItem {
  key: string;
  title: string;
  icon: IconName;
  href: string;
  /** A badge; readers hear what is counted: 'Alerts, 2 open'. */
  count?: number;
  /** What the count is of, after it: 'open', 'need somebody'. Left out: 'open'. */
  counted?: string;
}

export interface NavProps {
  items: readonly NavItem[];
  current: string;
  onGo: (item: NavItem) => void;
}

/** What a screen reader hears of an item. */
export const navLabel = ({ title, count, counted = 'open' }: NavItem): string =>
  count ? `${title}, ${count} ${counted}` : title;
