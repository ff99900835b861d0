import { useState, type ReactNode } from 'react';
import { View } from 'react-native';

/**
 * As wide as the column it stands in, for drawings that need the px: ribbons, charts. Nothing is drawn until the width
 * is known; `height` keeps the place meanwhile, so that nothing jumps.
 */
export function FullWidth({ height, children }: { height: number; children: (width: number) => ReactNode }) {
  const [width, setWidth] = useState(0);
  return (
    <View
      style={{ minHeight: height, alignSelf: 'stretch' }}
      onLayout={({ nativeEvent }) => setWidth(Math.floor(nativeEvent.layout.width))}
    >
      {width > 0 ? children(width) : null}
    </View>
  );
}
