/**
 * What the server last answered, kept on this device for the person who is signed in, so that the app can be read
 * without a connection: the board, the charges that were looked at, and what they need to be drawn. Nothing of repairs:
 * there are customers in them. Loaded late.
 */
import { hashKey, type QueryKey } from '@tanstack/react-query';
import { roots, type Root } from '../query-keys';

/** Answers that are kept, by the first word of their key. */
const keptRoots: ReadonlySet<Root> = new Set<Root>([
  roots.session,
  roots.board,
  roots.charges,
  roots.charge,
  roots.alerts,
  roots.workshop,
  roots.moduleTypes,
  roots.meters,
  roots.people,
  roots.spare,
  roots.benchPlan,
  roots.work,
  roots.staffing,
]);

/** Older than a long weekend it helps nobody at the bench, ms. */
export const keptForMs = 72 * 3600_000;
/** Of all answers together, and of one; characters. */
export const mostChars = 4_000_000;
export const mostCharsOfOne = 500_000;

export interface KeptAnswer {
  /** Person it was answered to; nobody else ever sees it. */
  owner: string;
  /** Build of the app that understood it. */
  build: string;
  /** Device's epoch ms of the answer. */
  at: number;
  key: QueryKey;
  text: string;
}

export interface AnswerStore {
  all: () => Promise<[string, KeptAnswer][]>;
  put: (entries: [string, KeptAnswer][]) => Promise<void>;
  drop: (ids: string[]) => Promise<void>;
  clear: () => Promise<void>;
}

export const isKept = (key: QueryKey): boolean => keptRoots.has(key[0] as Root) && key[1] !== 'wall';

/** @param build of the running app: another may have asked for another shape */
export function makeKeptAnswers(store: AnswerStore, build: string, deviceNow: () => number) {
  const sizes = new Map<string, { at: number; size: number }>();
  let known: Promise<void> | null = null;
  const isFresh = ({ at, build: of }: KeptAnswer): boolean =>
    of === build && deviceNow() - at <= keptForMs && at <= deviceNow() + keptForMs;

  /** Looks through what lies there, once: what is old or of another build goes. */
  function look(): Promise<void> {
    known ??= (async () => {
      const all = await store.all();
      const old = all.filter(([, answer]) => !isFresh(answer)).map(([id]) => id);
      for (const [id, answer] of all) if (!old.includes(id)) sizes.set(id, { at: answer.at, size: answer.text.length });
      if (old.length > 0) await store.drop(old);
    })();
    return known;
  }

  async function makeRoom(): Promise<void> {
    let total = [...sizes.values()].reduce((sum, { size }) => sum + size, 0);
    const gone: string[] = [];
    for (const [id, { size }] of [...sizes].sort(([, a], [, b]) => a.at - b.at)) {
      if (total <= mostChars) break;
      total -= size;
      sizes.delete(id);
      gone.push(id);
    }
    if (gone.length > 0) await store.drop(gone);
  }

  return {
    /** Keeps answers of a person; the oldest go where it gets too much. */
    keep: async (owner: string, answers: { key: QueryKey; at: number; data: unknown }[]): Promise<void> => {
      await look();
      const entries = answers.flatMap(({ key, at, data }): [string, KeptAnswer][] => {
        const text = JSON.stringify(data);
        return isKept(key) && text !== undefined && text.length <= mostCharsOfOne
          ? [[`${owner} ${hashKey(key)}`, { owner, build, at, key, text }]]
          : [];
      });
      if (entries.length === 0) return;
      await store.put(entries);
      for (const [id, { at, text }] of entries) sizes.set(id, { at, size: text.length });
      await makeRoom();
    },
    /** What was answered to this person, by this build, not too long ago. */
    of: async (owner: string): Promise<{ key: QueryKey; at: number; data: unknown }[]> =>
      (await store.all())
        .map(([, answer]) => answer)
        .filter((answer) => answer.owner === owner && isFresh(answer) && isKept(answer.key))
        .map(({ key, at, text }) => ({ key, at, data: JSON.parse(text) as unknown })),
    /** Everything goes, whosever it was. */
    clear: async (): Promise<void> => {
      sizes.clear();
      await store.clear();
    },
  };
}
