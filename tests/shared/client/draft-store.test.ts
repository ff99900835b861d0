import { beforeEach, describe, expect, it, vi } from 'vitest';
import { forgetDrafts, readDraft, writeDraft } from '@/shared/client/draft-store';

/** The browser's store, which outlives the page. */
class MemoryStorage {
  private readonly items = new Map<string, string>();
  get length() {
    return this.items.size;
  }
  key = (index: number) => [...this.items.keys()][index] ?? null;
  getItem = (key: string) => this.items.get(key) ?? null;
  setItem = (key: string, value: string) => void this.items.set(key, value);
  removeItem = (key: string) => void this.items.delete(key);
}

const now = Date.parse('2026-06-09T11:42:00Z');
const day = 86_400_000;

beforeEach(() => vi.stubGlobal('localStorage', new MemoryStorage()));

describe('drafts', () => {
  it('bring back what was typed, as it was typed', () => {
    writeDraft('ines', 'log.c1', { volts: '3,957 V', note: 'clip 2 warm' }, now);
    expect(readDraft('ines', 'log.c1', now + 3600_000)).toEqual({ volts: '3,957 V', note: 'clip 2 warm' });
  });

  it('are not shown to another person on the same device, nor in another form', () => {
    writeDraft('ines', 'log.c1', { volts: '3.9' }, now);
    expect(readDraft('bram', 'log.c1', now)).toBeNull();
    expect(readDraft('ines', 'log.c2', now)).toBeNull();
    expect(readDraft(null, 'log.c1', now)).toBeNull();
  });

  it('lapse after seven days', () => {
    writeDraft('ines', 'plan', { target: '3.968' }, now);
    expect(readDraft('ines', 'plan', now + 7 * day)).not.toBeNull();
    expect(readDraft('ines', 'plan', now + 7 * day + 1)).toBeNull();
    expect(readDraft('ines', 'plan', now)).toBeNull();
  });

  it('of a person go with signing out, those of others stay', () => {
    writeDraft('ines', 'plan', 1, now);
    writeDraft('ines', 'log.c1', 2, now);
    writeDraft('bram', 'plan', 3, now);
    forgetDrafts('ines');
    expect([readDraft('ines', 'plan', now), readDraft('ines', 'log.c1', now), readDraft('bram', 'plan', now)]).toEqual([
      null,
      null,
      3,
    ]);
  });

  it('are kept until the page closes where the browser refuses to store', () => {
    vi.stubGlobal('localStorage', {
      length: 0,
      key: () => null,
      getItem: () => null,
      setItem: () => {
        throw new DOMException('full', 'QuotaExceededError');
      },
      removeItem: () => {},
    });
    writeDraft('ines', 'plan', { target: '3.9' }, now);
    expect(readDraft('ines', 'plan', now)).toEqual({ target: '3.9' });
  });
});
