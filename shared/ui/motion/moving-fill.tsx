import { useEffect } from 'react';
import Animated, { Easing, useAnimatedProps, useSharedValue, withTiming } from 'react-native-reanimated';
import { Rect } from 'react-native-svg';
import { motion } from '../theme/tokens';
import type { LevelFillProps } from './level-fill';

const AnimatedRect = Animated.createAnimatedComponent(Rect);
const timing = { duration: motion.fill, easing: Easing.bezier(0.2, 0, 0, 1) };

/**
 * The fill of a vessel, sliding from where it stood to a new level. Only ever loaded late, through `LevelFill`: nothing
 * else may import Reanimated.
 */
export function MovingFill({ box, color, outline }: LevelFillProps) {
  const top = useSharedValue(box.y);
  const height = useSharedValue(box.h);
  useEffect(() => {
    top.set(withTiming(box.y, timing));
    height.set(withTiming(box.h, timing));
  }, [box.y, box.h, top, height]);
  const moving = useAnimatedProps(() => ({ y: top.get(), height: Math.max(0, height.get()) }));
  return (
    <AnimatedRect
      x={box.x}
      width={box.w}
      fill={color}
      stroke={outline}
      strokeWidth={outline ? 1.2 : 0}
      animatedProps={moving}
    />
  );
}
