import { cleanup, render, screen } from '@testing-library/react';
import { afterEach, expect, it } from 'vitest';
import { LabelSheet } from '@/shared/ui/label/label-sheet';

const label = { title: 'R-2409', spare: 'S-0402', position: null, line: '', volts: ['3.966'], ready: '' };
afterEach(cleanup);

/** The longest path of the drawing: the code. */
function drawn(url: string): string {
  render(<LabelSheet label={label} url={url} width={300} />);
  const code = [...screen.getByRole('img').querySelectorAll('path')]
    .map((path) => path.getAttribute('d') ?? '')
    .sort((a, b) => b.length - a.length)[0]!;
  cleanup();
  return code;
}

it('draws the code of this page’s own address where the operator has set none', () => {
  const whole = `${window.location.origin}/charges/c1`;
  expect(drawn('/charges/c1')).toBe(drawn(whole));
  expect(drawn('/charges/c1')).not.toBe(drawn('http://localhost:4300/charges/c1'));
});

it('keeps the address that the operator has set', () => {
  expect(drawn('https://bidewell.example.com/charges/c1')).not.toBe(drawn('/charges/c1'));
});
