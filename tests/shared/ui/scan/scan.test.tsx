import { cleanup, render, screen, waitFor } from '@testing-library/react';
import { create } from 'qrcode';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { scannedOf } from '@/shared/contract/scanned';
import { cameraProblem } from '@/shared/ui/scan/camera-problem';
import { CameraView } from '@/shared/ui/scan/camera-view.web';
import { readCode, type Frame } from '@/shared/ui/scan/read-code';

const address = 'https://bidewell.example.com/charges/0d6f3f0a-6a5e-4f4e-9d8c-2f5f5c0a3e11';

/** A camera's picture of a label: the code turned by some degrees on a grey bench, with the noise of a dim light. */
function pictureOf(text: string | null, { degrees = 0, noise = 0, width = 640, height = 480 } = {}): Frame {
  const data = new Uint8ClampedArray(width * height * 4);
  const modules = text === null ? null : create(text, { errorCorrectionLevel: 'M' }).modules;
  const side = 260;
  const quiet = 24;
  const turn = (-degrees * Math.PI) / 180;
  let seed = 7;
  const random = () => (seed = (seed * 16807) % 2147483647) / 2147483647 - 0.5;
  for (let y = 0; y < height; y += 1)
    for (let x = 0; x < width; x += 1) {
      const [dx, dy] = [x - width / 2, y - height / 2];
      const [u, v] = [dx * Math.cos(turn) - dy * Math.sin(turn), dx * Math.sin(turn) + dy * Math.cos(turn)];
      let light = 120;
      if (modules && Math.abs(u) < side / 2 + quiet && Math.abs(v) < side / 2 + quiet) {
        const at = (value: number) => Math.floor(((value + side / 2) / side) * modules.size);
        const inside = Math.abs(u) < side / 2 && Math.abs(v) < side / 2;
        light = inside && modules.get(at(v), at(u)) ? 45 : 205;
      }
      light += random() * noise;
      const place = (y * width + x) * 4;
      data.fill(light, place, place + 3);
      data[place + 3] = 255;
    }
  return { data, width, height };
}

describe('a code in a picture', () => {
  it.each([
    [0, 0],
    [-8, 30],
    [17, 30],
    [90, 30],
    [200, 30],
  ])('is read when it is turned by %i degrees, with a noise of %i of 255', (degrees, noise) => {
    expect(readCode(pictureOf(address, { degrees, noise }))).toBe(address);
  });

  it('is not made up where there is none', () => {
    expect(readCode(pictureOf(null, { noise: 60 }))).toBeNull();
  });
});

describe('what a code means', () => {
  it.each([
    [address, { kind: 'charge', id: '0d6f3f0a-6a5e-4f4e-9d8c-2f5f5c0a3e11' }],
    ['http://127.0.0.1:4300/charges/c1', { kind: 'charge', id: 'c1' }],
    ['http://bench.example.com/spares/s1?x=1', { kind: 'spare', id: 's1' }],
    [' S-0398 ', { kind: 'label', label: 'S-0398' }],
    ['https://example.com/elsewhere', { kind: 'nothing' }],
    ['https://example.com/charges/../../people', { kind: 'nothing' }],
    ['', { kind: 'nothing' }],
    ['x'.repeat(31), { kind: 'nothing' }],
  ])('%s', (text, meant) => expect(scannedOf(text)).toEqual(meant));
});

describe('the camera', () => {
  const stopped = vi.fn();
  const asked = vi.fn();
  const stream = { getTracks: () => [{ stop: stopped }] };
  let frame: Frame;
  beforeEach(() => {
    stopped.mockClear();
    asked.mockReset().mockResolvedValue(stream);
    frame = pictureOf(null);
    vi.stubGlobal('navigator', { mediaDevices: { getUserMedia: asked } });
    vi.spyOn(HTMLMediaElement.prototype, 'play').mockResolvedValue();
    vi.spyOn(HTMLVideoElement.prototype, 'videoWidth', 'get').mockReturnValue(640);
    vi.spyOn(HTMLVideoElement.prototype, 'videoHeight', 'get').mockReturnValue(480);
    const context = { drawImage: vi.fn(), getImageData: () => frame };
    vi.spyOn(HTMLCanvasElement.prototype, 'getContext').mockImplementation(() => context as never);
  });
  afterEach(() => {
    cleanup();
    vi.restoreAllMocks();
    vi.unstubAllGlobals();
  });

  it('tells the code once as soon as it is in the picture, and goes off', async () => {
    const onText = vi.fn();
    render(<CameraView onText={onText} onProblem={vi.fn()} />);
    expect(screen.getByLabelText('What the camera sees')).toBeTruthy();
    await waitFor(() => expect(asked).toHaveBeenCalledOnce());
    expect(asked.mock.calls[0]).toMatchObject([{ audio: false, video: { facingMode: 'environment' } }]);
    expect(onText).not.toHaveBeenCalled();
    frame = pictureOf(address, { degrees: 12, noise: 30 });
    await waitFor(() => expect(onText).toHaveBeenCalledExactlyOnceWith(address), { timeout: 4000 });
    expect(stopped).toHaveBeenCalled();
  });

  it('goes off when it is left without a code, even while the browser is still asking', async () => {
    const first = render(<CameraView onText={vi.fn()} onProblem={vi.fn()} />);
    await waitFor(() => expect(asked).toHaveBeenCalledOnce());
    await new Promise((resolve) => setTimeout(resolve, 50));
    first.unmount();
    expect(stopped).toHaveBeenCalled();

    stopped.mockClear();
    let allow: (value: typeof stream) => void = () => {};
    asked.mockReturnValue(new Promise((resolve) => (allow = resolve)));
    const second = render(<CameraView onText={vi.fn()} onProblem={vi.fn()} />);
    second.unmount();
    allow(stream);
    await waitFor(() => expect(stopped).toHaveBeenCalledOnce());
  });

  it('asks the browser’s own detector where it has one for QR codes', async () => {
    const detect = vi.fn().mockResolvedValue([{ rawValue: 'S-0398' }]);
    const own = Object.assign(
      vi.fn(function own() {
        return { detect };
      }),
      { getSupportedFormats: () => Promise.resolve(['qr_code']) },
    );
    vi.stubGlobal('BarcodeDetector', own);
    const onText = vi.fn();
    render(<CameraView onText={onText} onProblem={vi.fn()} />);
    await waitFor(() => expect(onText).toHaveBeenCalledExactlyOnceWith('S-0398'));
    expect(own).toHaveBeenCalledWith({ formats: ['qr_code'] });
  });

  it('says why there is no picture, and what to do', async () => {
    asked.mockRejectedValue(new DOMException('', 'NotAllowedError'));
    const onProblem = vi.fn();
    render(<CameraView onText={vi.fn()} onProblem={onProblem} />);
    await waitFor(() => expect(onProblem).toHaveBeenCalledOnce());
    expect(onProblem.mock.calls[0]![0]).toMatch(/not allowed here.*or type the label/);
    expect(cameraProblem(new DOMException('', 'NotFoundError'))).toMatch(/No camera/);
    expect(cameraProblem(new Error('?'))).toMatch(/could not be opened/);
  });
});
