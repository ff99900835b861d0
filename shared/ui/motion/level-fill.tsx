import { lazy, Suspense, useEffect, useState } from 'react';
import { Rect } from 'react-native-svg';
import { useReducedMotion } from '../theme/use-reduced-motion';

export interface LevelFillProps {
  box: { x: number; y: number; w: number; h: number };
  color: string;
  outline?: string;
}

/** The fill of a vessel, standing still. */
export const StillFill = ({ box, color, outline }: LevelFillProps) => (
  <Rect
    x={box.x}
    y={box.y}
    width={box.w}
    height={box.h}
    fill={color}
    stroke={outline}
    strokeWidth={outline ? 1.2 : 0}
  />
);

// Reanimated weighs more than everything else of the interface: it comes in a chunk of its own, after the first paint.
const MovingFill = lazy(() => import('./moving-fill').then((module) => ({ default: module.MovingFill })));

/**
 * A fill that slides to a new level in 600 ms where `moving`, and stands still otherwise: until the first paint is
 * done, while the motion part loads, and for everybody who asked for less motion.
 */
export function LevelFill({ moving, ...fill }: LevelFillProps & { moving: boolean }) {
  const reduced = useReducedMotion();
  const [painted, setPainted] = useState(false);
  useEffect(() => {
    if (!moving || reduced) return undefined;
    const timer = setTimeout(() => setPainted(true), 0);
    return () => clearTimeout(timer);
  }, [moving, reduced]);
  const still = <StillFill {...fill} />;
  if (!moving || reduced || !painted) return still;
  return (
    <Suspense fallback={still}>
      <MovingFill {...fill} />
    </Suspense>
  );
}
