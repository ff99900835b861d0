/** What stands on a hand-over sheet, in words and numbers ready to be drawn. */
import type { PaperWords } from './paper-words';

export interface PackPicture {
  /** 'Before: arrival, Thu 4 June 10:20, at 20 °C' */
  title: string;
  spread: string;
  groupVolts: readonly number[];
  /** 0-based. */
  odd: readonly number[];
  /** 'module 11: 3.869 V, 3.937 V', and the groups it points to; null: nothing is odd. */
  call: { text: string; groups: readonly number[] } | null;
}

export interface ReadingRow {
  name: string;
  when: string;
  lowest: string;
  highest: string;
  spread: string;
  ampHours: string;
  by: string;
}

export interface GroupRow {
  name: string;
  before: string;
  after: string;
  /** Of a module that was changed. */
  marked: boolean;
}

export interface NamedValue {
  name: string;
  value: string;
}

export interface PaperPhoto {
  /** 'Photo 2: Module 17, swelling' */
  title: string;
  /** What was noted on it, who took it and when. */
  note: string;
  /** A JPEG; null: its file is gone. */
  picture: Buffer | null;
  /** Pixels: its proportions. */
  width: number;
  height: number;
}

export interface HandOverContent {
  title: string;
  workshop: string;
  date: string;
  /** When what stands in it came about, epoch ms. */
  at: number;
  facts: { left: NamedValue[]; right: NamedValue[] };
  found: string[];
  before: PackPicture | null;
  after: PackPicture | null;
  readings: ReadingRow[];
  changed: NamedValue[];
  advised: NamedValue[];
  cautions: string[];
  /** Above the table of all groups. */
  groupsNote: string;
  groups: GroupRow[];
  /** Median, lowest, highest and spread of each reading that the table shows. */
  sums: { name: string; values: string[] }[];
  footnotes: string[];
  /** The first taken first. */
  photos: PaperPhoto[];
  signatures: [string, string];
  words: PaperWords;
}
