import { CalcInputError } from '../errors';

/**
 * A stream of numbers in [0, 1) that is the same for the same seed: xoshiro128** over 32-bit words, its state filled
 * by splitmix32.
 *
 * Source of the generator: D. Blackman, S. Vigna, ACM Trans. Math. Softw. 47 (2021) 36.
 *
 * @param seed a whole number
 * @throws CalcInputError for a seed that is no whole number
 */
export function seededRandom(seed: number): () => number {
  if (!Number.isSafeInteger(seed)) throw new CalcInputError('seed', seed, 'a whole number');
  const high = Math.floor(seed / 2 ** 32);
  let mixer = (seed ^ Math.imul(high, 0x9e3779b1)) >>> 0;
  const mix = () => {
    mixer = (mixer + 0x9e3779b9) >>> 0;
    let word = mixer;
    word = Math.imul(word ^ (word >>> 16), 0x21f0aaad);
    word = Math.imul(word ^ (word >>> 15), 0x735a2d97);
    return (word ^ (word >>> 15)) >>> 0;
  };
  let a = mix();
  let b = mix();
  let c = mix();
  let d = mix();
  const word = () => {
    const turned = Math.imul(rotate(Math.imul(b, 5), 7), 9) >>> 0;
    const shifted = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= shifted;
    d = rotate(d, 11);
    return turned;
  };
  return () => ((word() >>> 5) * 67108864 + (word() >>> 6)) / 9007199254740992;
}

function rotate(word: number, bits: number): number {
  return (word << bits) | (word >>> (32 - bits));
}
