import { useState } from 'react';
import type { LayoutChangeEvent } from 'react-native';

/** The width a drawing has, px; 0 until it has been laid out. */
export function useWidth() {
  const [width, setWidth] = useState(0);
  return {
    width,
    onLayout: ({ nativeEvent }: LayoutChangeEvent) => setWidth(Math.round(nativeEvent.layout.width)),
  };
}
