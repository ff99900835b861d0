/** A notice outside the page. One per `tag`: a later one replaces the earlier. */
export interface Notice {
  title: string;
  body: string;
  /** Address within this site that a tap opens. */
  url: string;
  tag: string;
  /** Of an alert: one that is shown already with the same turn is not told a second time. */
  id?: string;
  turn?: number;
}

/** 'default': not asked yet. 'unavailable': this device or address has none. */
export type NoticePermission = 'granted' | 'denied' | 'default' | 'unavailable';
