/** What stands on a day sheet, in words. */
export interface DayRow {
  /** '09:30–10:30', '13:50' */
  when: string;
  what: string;
  /** 'bay 3', 'A2'; '' where there is none. */
  where: string;
}
export interface DayPerson {
  name: string;
  /** '08:00–17:00, break 12:00–12:30', 'Day off: holiday' */
  hours: string;
  rows: DayRow[];
}
export interface ChannelCharge {
  title: string;
  /** 'clip on 14:00', 'since 11:50', 'ready 10:41' */
  state: string;
  /** '17:05 (16:40–18:05)'; '' where it is over. */
  ready: string;
  due: string;
  /** 'Ines 13:50, Marek 14:50'; '' where none are to come. */
  lookIns: string;
}
export interface DayChannel {
  name: string;
  kind: string;
  charges: ChannelCharge[];
}

export interface DaySheetContent {
  title: string;
  workshop: string;
  /** 'Tuesday 9 June 2026' */
  date: string;
  /** 'As it stood on Tue 9 June at 13:42.' */
  stand: string;
  at: number;
  people: DayPerson[];
  channels: DayChannel[];
  cautions: string[];
}
