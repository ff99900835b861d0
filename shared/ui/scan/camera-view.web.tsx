import { useEffect, useRef } from 'react';
import { cameraProblem } from './camera-problem';
import type { CameraViewProps } from './camera-view';
import { frameReader } from './frame-reader';

/** Pause between two looks, ms: a hand needs longer to hold a label still. */
const PAUSE_MS = 120;

const wait = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

/** What the camera sees, looked at until a code is in it. The camera goes off as soon as this is left. */
export function CameraView({ onText, onProblem }: CameraViewProps) {
  const video = useRef<HTMLVideoElement>(null);
  const heard = useRef({ onText, onProblem });
  useEffect(() => {
    heard.current = { onText, onProblem };
  });
  useEffect(() => {
    let left = false;
    let stream: MediaStream | null = null;
    const off = () => stream?.getTracks().forEach((track) => track.stop());
    const look = async () => {
      stream = await navigator.mediaDevices.getUserMedia({
        audio: false,
        video: { facingMode: 'environment', width: { ideal: 1280 } },
      });
      const shown = video.current;
      // Left while the browser asked: the camera is on by now.
      if (left || !shown) return off();
      shown.srcObject = stream;
      await shown.play();
      const read = await frameReader();
      while (!left) {
        const text = shown.videoWidth > 0 ? await read(shown) : null;
        if (left) return;
        if (text !== null) {
          off();
          heard.current.onText(text);
          return;
        }
        await wait(PAUSE_MS);
      }
    };
    look().catch((error: unknown) => {
      off();
      if (!left) heard.current.onProblem(cameraProblem(error));
    });
    return () => {
      left = true;
      off();
    };
  }, []);
  return (
    <video
      ref={video}
      muted
      playsInline
      aria-label="What the camera sees"
      style={{ display: 'block', width: '100%', aspectRatio: '4 / 3', objectFit: 'cover', background: 'black' }}
    />
  );
}
