import { useRef, type RefObject } from 'react';
import type { View } from 'react-native';
import { quarterMs, type Candidate } from './move-candidate';

/** px a pointer has to travel before it drags. */
const dragFrom = 6;

/** The part of a pointer event that a drag reads. */
export interface LanePointer {
  pointerType: string;
  button: number;
  pointerId: number;
  clientX: number;
  clientY: number;
  currentTarget: unknown;
}

interface Drag {
  chargeId: string;
  startX: number;
  startY: number;
  clipOn: number;
  moving: boolean;
  last: Candidate | null;
}

/**
 * A charge drawn along the time line with a mouse or a pen. A finger scrolls the page instead; by touch a charge is
 * picked and its place chosen. `lanes` holds the element of each channel's lane by its id.
 *
 * @param msPerPx how much time a px of the axis is
 */
export function useLaneDrag({
  lanes,
  msPerPx,
  onDrag,
  onDrop,
  onCancel,
}: {
  lanes: RefObject<Map<string, View | null>>;
  msPerPx: number;
  onDrag: (chargeId: string, candidate: Candidate) => void;
  onDrop: (chargeId: string, candidate: Candidate) => void;
  onCancel: () => void;
}) {
  const drag = useRef<Drag | null>(null);
  const dropped = useRef(false);

  const laneAt = (clientY: number): string | null => {
    for (const [id, lane] of lanes.current) {
      const box = (lane as unknown as HTMLElement | null)?.getBoundingClientRect?.();
      if (box && clientY >= box.top && clientY < box.bottom) return id;
    }
    return null;
  };

  return {
    /** Whether the press that is coming in ends a drag: it picks nothing. */
    wasDrag: (): boolean => dropped.current,
    begin: (event: LanePointer, chargeId: string, clipOn: number) => {
      dropped.current = false;
      if (event.pointerType === 'touch' || event.button !== 0) return;
      drag.current = { chargeId, startX: event.clientX, startY: event.clientY, clipOn, moving: false, last: null };
      (event.currentTarget as Partial<HTMLElement>).setPointerCapture?.(event.pointerId);
    },
    move: (event: LanePointer) => {
      const one = drag.current;
      if (!one) return;
      const far = Math.hypot(event.clientX - one.startX, event.clientY - one.startY) >= dragFrom;
      if (!one.moving && !far) return;
      one.moving = true;
      const channelId = laneAt(event.clientY);
      if (channelId === null) return;
      const wanted = one.clipOn + (event.clientX - one.startX) * msPerPx;
      one.last = { channelId, clipOn: Math.round(wanted / quarterMs) * quarterMs };
      onDrag(one.chargeId, one.last);
    },
    end: () => {
      const one = drag.current;
      drag.current = null;
      if (!one?.moving) return;
      dropped.current = true;
      // The click of this press comes before any timer.
      setTimeout(() => (dropped.current = false), 0);
      if (one.last) onDrop(one.chargeId, one.last);
    },
    cancel: () => {
      if (drag.current?.moving) onCancel();
      drag.current = null;
    },
  };
}
export type LaneDrag = ReturnType<typeof useLaneDrag>;
