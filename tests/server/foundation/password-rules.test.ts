import { describe, expect, it } from 'vitest';
import { commonPasswords } from '@/server/services/common-passwords';
import { ownWords, weaknessOf } from '@/server/services/password-rules';
import { newPassword } from '@/shared/contract/session';

const own = ownWords({
  workshopName: 'Harbour Lane Traction',
  name: 'Ines Marlow',
  email: 'ines.m@harbourlane.example',
});
const sentence = (password: string) => newPassword.safeParse(password).error?.issues[0]?.message ?? null;

describe('the length of a password', () => {
  it('is at least 12 characters, counted as people see them', () => {
    expect(sentence('elevenchars')).toContain('12 characters');
    expect(sentence('twelve chars')).toBeNull();
    expect(sentence('🔋'.repeat(11))).toContain('12 characters');
    expect(sentence('🔋'.repeat(12))).toBeNull();
  });

  it('is at most 72 bytes, which is what bcrypt reads', () => {
    expect(sentence('ä'.repeat(36))).toBeNull();
    expect(sentence('ä'.repeat(37))).toContain('72 bytes');
    expect(sentence(`${'x'.repeat(72)}`)).toBeNull();
    expect(sentence('x'.repeat(73))).toContain('72 bytes');
  });

  it('allows spaces, any script and any sign', () => {
    for (const password of [
      'пароль моря и пристани',
      '  leading spaces  ',
      '木星は静かな灯台です光る海',
      '§€¶ĸ·ŧ←¡÷×–…',
    ])
      expect(sentence(password)).toBeNull();
  });
});

describe('a password that is tried first', () => {
  it.each([
    'password1234',
    'Passw0rd!!!!',
    'P@$$w0rd2026',
    'qwertyuiop12',
    'qwertyuiopasdf',
    '1qaz2wsx3edc',
    '123456789012',
    '098765432109',
    'abcdefghijkl',
    'aaaaaaaaaaaa',
    'abcabcabcabc',
    '121212121212',
    'iloveyou2026',
    'dragonmonkey',
    'football2026!',
    'welcome12345',
    'letmeinplease1',
    'changeme1234',
  ])('is refused: %s', (password) => {
    expect(weaknessOf(password, own)).not.toBeNull();
  });

  it.each([
    ['bidewell2026', 'this product’s name'],
    ['B1dew3ll!!!!', 'this product’s name'],
    ['harbourlane1', 'your address'],
    ['HarbourLaneTraction1', 'the workshop’s name'],
    ['inesmarlow26', 'your name'],
    ['Marlow123456', 'your name'],
  ])('is refused for what it is built on: %s, %s', (password, called) => {
    expect(weaknessOf(password, own)).toContain(called);
  });

  it.each([
    'quiet harbour lantern 7',
    'clamp the busbar twice',
    'rust-lamp-orchid-9',
    'correct horse battery staple',
    'kV7!xq2#Lm9p',
    'seven lamps over the slipway',
    '918273645019',
    'Marlow likes cold rain on slate',
    'пароль моря и пристани',
  ])('is not one of these: %s', (password) => {
    expect(weaknessOf(password, own)).toBeNull();
  });
});

it('the list holds some three hundred and more, in the form they are compared in', () => {
  expect(commonPasswords.size).toBeGreaterThanOrEqual(300);
  for (const word of commonPasswords) expect(word).toMatch(/^[a-z]+$/);
});
