import { useLayoutEffect, useRef, useState, type ReactNode } from 'react';
import { View } from 'react-native';

/**
 * As wide as the column it stands in, for drawings that need the px: ribbons, charts. Nothing is drawn until the width
 * is known; `height` keeps the place meanwhile, so that nothing jumps.
 */
export function FullWidth({ height, children }: { height: number; children: (width: number) => ReactNode }) {
  const [width, setWidth] = useState(0);
  const place = useRef<View>(null);
  // The layout is told a frame or more late, on a busy device much more: a browser knows the width at once.
  useLayoutEffect(() => {
    const known = (place.current as { offsetWidth?: number } | null)?.offsetWidth ?? 0;
    if (known > 0) setWidth(known);
  }, []);
  return (
    <View
      ref={place}
      style={{ minHeight: height, alignSelf: 'stretch' }}
      onLayout={({ nativeEvent }) => setWidth(Math.floor(nativeEvent.layout.width))}
    >
      {width > 0 ? children(width) : null}
    </View>
  );
}
