/** The log of a charge as a file: how its columns are understood, and what the server has understood of it. */
import * as z from 'zod/mini';
import type { ChargeDto } from './charge';
import { optionalInstant, type Instant } from './common';
import type { LogSeparator, LogUse } from './charge-log-words';

const use = z.enum(['none', 'time', 'date', 'volts', 'amps', 'celsius', 'group']);
const separator = z.enum([',', ';', '\t']);

/** How a file is to be read. Left out: as the server guesses. */
export const logChoicesSchema = z.object({
  separator,
  decimal: z.enum(['.', ',']),
  /** Line that names the columns, from 1; 0: none does. */
  headerLine: z.int().check(z.minimum(0), z.maximum(200)),
  columns: z
    .array(z.object({ use, unit: z.string().check(z.maxLength(12)) }))
    .check(z.maxLength(64, 'A log of more than 64 columns is not read. Leave some out of it.')),
  /** Instant from which elapsed times count; null: the start of the charge. */
  zeroAt: optionalInstant,
  /** Where the volts between the clips were read; null: nobody says. */
  takenAt: z.nullable(z.enum(['supply', 'module'])),
});
export interface LogChoices {
  separator: LogSeparator;
  decimal: '.' | ',';
  headerLine: number;
  columns: { use: LogUse; unit: string }[];
  zeroAt: Instant | null;
  takenAt: 'supply' | 'module' | null;
}

/** The choices travel beside the file as JSON, its name for the line in the charge's log. */
export const logQuerySchema = z.object({
  choices: z.optional(z.string().check(z.maxLength(8000, 'The choices are longer than any file needs.'))),
  name: z.optional(
    z.string().check(z.maxLength(200, 'The name of the file is longer than 200 characters. Shorten it.')),
  ),
});
export interface LogQuery {
  choices?: string;
  name?: string;
}

export interface LogRowDto {
  /** In the file, from 1. */
  line: number;
  at: Instant;
  terminalVolts: number | null;
  amps: number | null;
  celsius: number | null;
  groupVolts: number[] | null;
}

/** What was understood of a file. Nothing is written with it. */
export interface LogPreviewDto {
  choices: LogChoices;
  columns: { name: string; samples: string[] }[];
  /** First readings as they would be kept. */
  rows: LogRowDto[];
  /** Lines of the file, without empty ones at its end. */
  lines: number;
  readings: number;
  firstAt: Instant | null;
  lastAt: Instant | null;
  /** Of the readings so many are stored, so many of these are there already. */
  stored: number;
  there: number;
  /** How far a reading that is not stored lies from the straight line between the stored ones, at most. */
  within: { terminalVolts: number; amps: number; celsius: number; groupVolts: number; mostS: number };
  leftOut: { reason: string; count: number; lines: number[] }[];
  /** Sentence why it cannot be taken as it is; null: it can. */
  problem: string | null;
}

export interface LogTakenDto {
  charge: ChargeDto;
  /** Readings that are new with it, and those that were there. */
  added: number;
  there: number;
}
