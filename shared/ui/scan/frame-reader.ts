/** Reads codes out of a running video: by the browser's own detector where it has one, else by a decoder loaded now. */

interface Detected {
  rawValue: string;
}
interface Detector {
  detect: (source: HTMLVideoElement) => Promise<Detected[]>;
}
interface DetectorClass {
  new (options: { formats: string[] }): Detector;
  getSupportedFormats: () => Promise<string[]>;
}

export type FrameReader = (video: HTMLVideoElement) => Promise<string | null>;

/** A wider picture tells no more of a label and takes longer. */
const MOST_WIDTH = 640;

/** The browser's own detector, where it knows QR codes. */
async function ownDetector(): Promise<Detector | null> {
  const found = (globalThis as { BarcodeDetector?: DetectorClass }).BarcodeDetector;
  if (!found) return null;
  const formats = await found.getSupportedFormats().catch((): string[] => []);
  return formats.includes('qr_code') ? new found({ formats: ['qr_code'] }) : null;
}

/** @throws where the decoder could not be loaded */
export async function frameReader(): Promise<FrameReader> {
  const detector = await ownDetector();
  if (detector)
    return async (video) => {
      const [first] = await detector.detect(video);
      return first?.rawValue.trim() || null;
    };
  const { readCode } = await import('./read-code');
  const canvas = document.createElement('canvas');
  const context = canvas.getContext('2d', { willReadFrequently: true });
  return (video) => {
    const scale = Math.min(1, MOST_WIDTH / video.videoWidth);
    const [width, height] = [Math.round(video.videoWidth * scale), Math.round(video.videoHeight * scale)];
    if (!context || width === 0 || height === 0) return Promise.resolve(null);
    canvas.width = width;
    canvas.height = height;
    context.drawImage(video, 0, 0, width, height);
    return Promise.resolve(readCode(context.getImageData(0, 0, width, height)));
  };
}
