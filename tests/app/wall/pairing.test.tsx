import { render, screen } from '@testing-library/react';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { userCodeLetters } from '@/shared/contract/wall';
import { FormatsProvider } from '@/shared/ui/format/formats';
import { ThemeProvider } from '@/shared/ui/theme/theme';
import { qrPath } from '@/shared/ui/wall/qr-code';
import { codeSize, WallPairing } from '@/shared/ui/wall/wall-pairing';
import { metresNumber, reachOf, reachSentence } from '@/shared/ui/wall/wall-reach';
import { at, now, zone } from './cards';

describe('the pairing view', () => {
  it('leads with the code, says when it changes and what cannot be had here', () => {
    render(
      <ThemeProvider choice="night">
        <FormatsProvider languageTag="en-GB" zone={zone}>
          <WallPairing
            code="BCDF-GHJK"
            word="This screen wants to show a board. Its code is"
            address={null}
            changesAt={at('13:52')}
            now={now}
            notes={['This screen may fall asleep: a browser keeps it awake only over https.']}
          />
        </FormatsProvider>
      </ThemeProvider>,
    );
    expect(screen.getByText('BCDF-GHJK')).toBeTruthy();
    expect(screen.getByText('It changes at 13:52.')).toBeTruthy();
    expect(screen.getByText(/may fall asleep/)).toBeTruthy();
  });

  it('sets any code as large as its letters let it be: 240 px at least, never wider than the picture', () => {
    const letter = fc.constantFrom(...userCodeLetters);
    fc.assert(
      fc.property(fc.array(letter, { minLength: 8, maxLength: 8 }), (letters) => {
        const code = `${letters.slice(0, 4).join('')}-${letters.slice(4).join('')}`;
        expect(codeSize(code)).toBeGreaterThanOrEqual(240);
        expect(codeSize(code)).toBeLessThanOrEqual(450);
      }),
    );
  });
});

describe('the QR code', () => {
  it('has the quiet zone of four modules and the finder squares of the standard at three corners', () => {
    const { d, side } = qrPath('http://192.168.1.20:4300/approve?code=BCDF-GHJK');
    const dark = new Set([...d.matchAll(/M(\d+) (\d+)h/g)].map(([, x, y]) => `${x},${y}`));
    const is = (x: number, y: number) => dark.has(`${x},${y}`);
    for (let i = 0; i < side; i++)
      for (let k = 0; k < 4; k++) {
        expect(is(i, k) || is(k, i) || is(i, side - 1 - k) || is(side - 1 - k, i)).toBe(false);
      }
    // ISO/IEC 18004: a dark square of 7, a light ring in it, a dark core of 3.
    const finder = (x0: number, y0: number) => {
      for (let y = 0; y < 7; y++)
        for (let x = 0; x < 7; x++) {
          const ring = Math.max(Math.abs(x - 3), Math.abs(y - 3));
          expect(is(x0 + x, y0 + y)).toBe(ring !== 2);
        }
    };
    finder(4, 4);
    finder(side - 11, 4);
    finder(4, side - 11);
  });
});

describe('how far a wall is read', () => {
  // The table of the look, §11: the same five parts on 43 and on 55 inches.
  it.each([
    [43, ['8.8', '7', '6', '3.9', '3']],
    [55, ['11', '9', '7.6', '5', '3.8']],
  ])('on %i inches within 3 %% of the table', (inches, table) => {
    reachOf(inches).forEach(({ metres }, i) => expect(metres / Number(table[i])).toBeCloseTo(1, 1));
    reachOf(inches).forEach(({ metres }, i) => expect(Math.abs(metres / Number(table[i]) - 1)).toBeLessThan(0.03));
  });

  it('says which parts are for those who step closer', () => {
    expect(reachSentence(reachOf(55), 7)).toBe('Stage word and band are for those who step closer.');
    expect(reachSentence(reachOf(55), 3)).toBe('All of it is read from there.');
    expect(reachSentence(reachOf(55), 20)).toBe('Too far for this screen: nothing of it is read from there.');
  });

  it('prints 11 and 7.6', () => {
    expect([metresNumber(11.27), metresNumber(7.64), metresNumber(4.96)]).toEqual(['11', '7.6', '5']);
  });
});
