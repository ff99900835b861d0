import { render, waitFor } from '@testing-library/react';
import Svg from 'react-native-svg';
import { expect, test } from 'vitest';
import { MovingFill } from '@/shared/ui/motion/moving-fill';

const fill = (y: number, h: number) => (
  <Svg width={40} height={120}>
    <MovingFill box={{ x: 4, y, w: 20, h }} color="#2259B8" />
  </Svg>
);

test('a fill that rises from 30 to 90 of 120 passes levels in between and stops at 90', async () => {
  const view = render(fill(90, 30));
  const rect = view.container.querySelector('rect');
  const height = () => Number(rect?.getAttribute('height'));
  await waitFor(() => expect(height()).toBe(30));

  const seen = new Set<number>();
  const watch = new MutationObserver(() => seen.add(height()));
  watch.observe(rect!, { attributes: true });
  view.rerender(fill(30, 90));
  await waitFor(() => expect(height()).toBe(90), { timeout: 5000 });
  watch.disconnect();

  const between = [...seen].filter((each) => each > 30 && each < 90);
  expect(between.length).toBeGreaterThan(0);
  expect(between).toEqual([...between].sort((a, b) => a - b));
});
