import { invalid } from '../errors/domain-error';
import { commonPasswords } from './common-passwords';

/** What the password must not be built on, with what to call it. */
export type OwnWords = { text: string; called: string }[];

const digitsForLetters: Record<string, string> = {
  '@': 'a',
  '4': 'a',
  '3': 'e',
  '1': 'i',
  '!': 'i',
  '0': 'o',
  '5': 's',
  $: 's',
  '7': 't',
};
/** Fewer characters than this beside a word everybody tries add too little. */
const enoughBeside = 8;

const plain = (text: string): string => text.normalize('NFKC').toLowerCase();
const letters = (text: string): string => [...text].filter((character) => /\p{L}/u.test(character)).join('');
const spelled = (text: string): string =>
  letters([...text].map((character) => digitsForLetters[character] ?? character).join(''));

/** How a password may be meant: its letters alone, and with digits and signs read as letters, those at its ends perhaps not. */
const formsOf = (typed: string): string[] => {
  const open = typed.replace(/[^\p{L}]+$/u, '');
  return [letters(typed), spelled(typed), spelled(open), spelled(open.replace(/^[^\p{L}]+/u, ''))];
};

/** 'abcabcabcabc', '1212…', '111…': one short piece over and over. */
function isRepeated(text: string): boolean {
  for (let length = 1; length <= 4; length += 1)
    if (
      text
        .slice(0, length)
        .repeat(Math.ceil(text.length / length))
        .startsWith(text)
    )
      return true;
  return false;
}

/** '123456789012', 'abcdefghijkl', 'lkjihg…': each character the neighbour of the one before. */
function isRow(text: string): boolean {
  const rows = [
    '12345678901234567890',
    'abcdefghijklmnopqrstuvwxyzabc',
    'qwertyuiopasdfghjklzxcvbnm',
    '1qaz2wsx3edc4rfv5tgb6yhn',
  ];
  return rows.some((row) => row.includes(text) || [...row].reverse().join('').includes(text));
}

/** Whether letters are nothing but one or two of the words that are tried first. */
function isCommon(text: string): boolean {
  if (commonPasswords.has(text)) return true;
  for (let at = 1; at < text.length; at += 1)
    if (commonPasswords.has(text.slice(0, at)) && commonPasswords.has(text.slice(at))) return true;
  return false;
}

/**
 * Why a password of sufficient length is still one of the first that are tried; null where it is not.
 * @param own the workshop's name, the address, the person's name
 */
export function weaknessOf(password: string, own: OwnWords): string | null {
  const typed = plain(password);
  if (isRepeated(typed)) return 'It repeats itself, and such passwords are tried first. Use several words of your own.';
  if (isRow(typed)) return 'It runs along the keyboard or the alphabet. Use several words of your own.';
  for (const { text, called } of [{ text: 'bidewell', called: 'this product’s name' }, ...own]) {
    const word = letters(plain(text));
    if (word.length < 4) continue;
    for (const form of formsOf(typed))
      if (form.includes(word) && [...typed].length - word.length < enoughBeside)
        return `It is little more than ${called}. Use several words that have nothing to do with you.`;
  }
  for (const form of formsOf(typed)) {
    const beside = [...typed].length - form.length;
    if (form !== '' && isCommon(form) && beside < enoughBeside)
      return 'It is among the passwords that are tried first. Use several words of your own.';
  }
  return null;
}

/** @throws DomainError 400 at the field `password` with the reason */
export function refuseWeakPassword(password: string, own: OwnWords): void {
  const weakness = weaknessOf(password, own);
  if (weakness) throw invalid({ password: weakness });
}

/** What a person's password must not be built on. */
export const ownWords = (who: { workshopName: string; name: string; email: string }): OwnWords => [
  { text: who.workshopName, called: 'the workshop’s name' },
  { text: who.name, called: 'your name' },
  ...who.name.split(/\s+/).map((text) => ({ text, called: 'your name' })),
  { text: who.email.split('@')[0] ?? '', called: 'your address' },
  { text: (who.email.split('@')[1] ?? '').split('.')[0] ?? '', called: 'your address' },
];
