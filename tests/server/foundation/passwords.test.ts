import bcrypt from 'bcryptjs';
import { afterAll, describe, expect, it } from 'vitest';
import { makePasswords } from '@/server/services/passwords';

const passwords = makePasswords();
afterAll(() => passwords.close());

describe('passwords', () => {
  it('are hashed with bcrypt at cost 12, which another reader of bcrypt agrees with', async () => {
    const hash = await passwords.hash('clamp the busbar twice');
    expect(hash).toMatch(/^\$2[aby]\$12\$/);
    expect(await bcrypt.compare('clamp the busbar twice', hash)).toBe(true);
    expect(await passwords.matches('clamp the busbar twice', hash)).toBe(true);
    expect(await passwords.matches('clamp the busbar thrice', hash)).toBe(false);
  });

  it('count composed and decomposed letters as the same', async () => {
    const hash = await passwords.hash('Prüfstand im Hafen');
    expect(await passwords.matches('Pru\u0308fstand im Hafen', hash)).toBe(true);
  });

  it('never match for nobody, after a comparison all the same', async () => {
    expect(await passwords.matches('anything at all', null)).toBe(false);
  });

  it('let the event loop turn while four are hashed at once', async () => {
    let turns = 0;
    const timer = setInterval(() => (turns += 1), 5);
    await Promise.all(['first', 'second', 'third', 'fourth'].map((word) => passwords.hash(`${word} of four at once`)));
    clearInterval(timer);
    // Hashed on this thread, four of them leave at most a turn between two.
    expect(turns).toBeGreaterThan(10);
  });
});
