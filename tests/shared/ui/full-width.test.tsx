import { render, screen } from '@testing-library/react';
import { Text } from 'react-native';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { FullWidth } from '@/shared/ui/primitives/full-width';

const drawing = () => render(<FullWidth height={100}>{(width) => <Text>{`drawn ${width}`}</Text>}</FullWidth>);

describe('a drawing as wide as its column', () => {
  afterEach(() => vi.restoreAllMocks());

  it('stands at once where the browser knows the width, before a layout is told', () => {
    vi.spyOn(HTMLElement.prototype, 'offsetWidth', 'get').mockReturnValue(358);
    drawing();
    expect(screen.getByText('drawn 358')).toBeTruthy();
  });

  it('is not drawn while no width is known', () => {
    drawing();
    expect(screen.queryByText(/drawn/)).toBeNull();
  });
});
