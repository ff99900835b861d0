import type { ReactNode } from 'react';

export interface CameraViewProps {
  /** What a code in the picture says; told once. */
  onText: (text: string) => void;
  /** Why there is no picture, with what to do. */
  onProblem: (sentence: string) => void;
}

/** What the camera sees. Only the web opens it: its file stands beside this one. */
export const CameraView = (_: CameraViewProps): ReactNode => null;
