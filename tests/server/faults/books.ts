/** What a data folder holds after its server has ended, read by SQL alone. */
import Database from 'better-sqlite3';
import { databaseFile } from '@/server/data-files';

export interface Line {
  kind: string;
  by: string | null;
}

export interface ChargeBooks {
  history: Line[];
  stretches: number;
  checks: number;
  alerts: string[];
}

export interface Entry {
  /** Alert, its turn and the person, as the messages name them. */
  name: string;
  way: string;
  state: string;
  reason: string | null;
  alertCleared: boolean;
}

export interface Books {
  charges: Map<string, ChargeBooks>;
  alertIds: string[];
  /** Causes that have more than one alert. */
  doubledCauses: string[];
  entries: Entry[];
  damage: unknown[];
}

/**
 * What a charge goes through, and what may come after it. `back`: current off said again at a later time while the check
 * is due sends the charge back to its rest, and the check falls due a second time.
 */
const follows: Record<string, string[]> = {
  planned: ['started'],
  started: ['held', 'tapering', 'resting'],
  tapering: ['held', 'resting'],
  held: ['resumed'],
  resumed: ['held', 'tapering', 'resting'],
  resting: ['check-due', 'back'],
  'check-due': ['ready', 'back'],
  back: ['held', 'tapering', 'resting', 'check-due'],
  ready: ['fitted', 'shelved'],
  fitted: [],
  shelved: [],
};
const isTransition = ({ kind }: Line): boolean => kind in follows;

/** Transitions of a history that cannot follow what was before them: 'resting after held'. */
export function impossibleIn(history: readonly Line[]): string[] {
  const kinds = history.filter(isTransition).map(({ kind }) => kind);
  return kinds.flatMap((kind, place) => {
    const before = kinds[place - 1];
    if (before === undefined) return kind === 'planned' ? [] : [`${kind} first`];
    return follows[before]!.includes(kind) ? [] : [`${kind} after ${before}`];
  });
}

function reading<T>(dataDir: string, read: (all: (sql: string) => Record<string, unknown>[]) => T): T {
  const database = new Database(databaseFile(dataDir), { readonly: true });
  try {
    return read((sql) => database.prepare(sql).all() as Record<string, unknown>[]);
  } finally {
    database.close();
  }
}

/** How many transitions all charges have behind them; plans and ways back are not counted. */
export const transitionsIn = (dataDir: string): number =>
  reading(dataDir, (all) => {
    const kinds = Object.keys(follows).filter((kind) => kind !== 'planned' && kind !== 'back');
    const [row] = all(
      `SELECT count(*) AS n FROM charge_event WHERE kind IN (${kinds.map((kind) => `'${kind}'`).join()})`,
    );
    return row!.n as number;
  });

/** How many charges the server has still to look at: their instant has come. */
export const dueIn = (dataDir: string, now: number): number =>
  reading(dataDir, (all) => all(`SELECT count(*) AS n FROM charge WHERE next_due_at <= ${now}`)[0]!.n as number);

export const readBooks = (dataDir: string): Books =>
  reading(dataDir, (all) => {
    const charges = new Map<string, ChargeBooks>();
    for (const { id } of all('SELECT id FROM charge'))
      charges.set(id as string, { history: [], stretches: 0, checks: 0, alerts: [] });
    for (const { id, kind, by } of all(
      'SELECT charge_id AS id, kind, person_id AS by FROM charge_event ORDER BY created_at, rowid',
    ))
      charges.get(id as string)!.history.push({ kind: kind as string, by: by as string | null });
    for (const { id } of all('SELECT charge_id AS id FROM run_stretch')) charges.get(id as string)!.stretches += 1;
    for (const { id } of all('SELECT charge_id AS id FROM rest_check')) charges.get(id as string)!.checks += 1;
    const alerts = all('SELECT id, charge_id AS charge, kind, cause FROM alert ORDER BY raised_at, rowid');
    for (const { charge, kind } of alerts) charges.get(charge as string)!.alerts.push(kind as string);
    const entries = all(
      `SELECT e.alert_id AS alert, e.turn, e.person_id AS person, e.way, e.state, e.reason, a.cleared_at AS cleared
       FROM outbox_entry e JOIN alert a ON a.id = e.alert_id`,
    );
    return {
      charges,
      alertIds: alerts.map(({ id }) => id as string),
      doubledCauses: all('SELECT cause FROM alert GROUP BY cause HAVING count(*) > 1').map(
        ({ cause }) => cause as string,
      ),
      entries: entries.map(({ alert, turn, person, way, state, reason, cleared }) => ({
        name: `${String(alert)} ${String(turn)} ${String(person).replace('own-', '')}`,
        way: way as string,
        state: state as string,
        reason: reason as string | null,
        alertCleared: cleared !== null,
      })),
      damage: [...all('PRAGMA integrity_check'), ...all('PRAGMA foreign_key_check')].filter(
        (row) => row.integrity_check !== 'ok',
      ),
    };
  });
