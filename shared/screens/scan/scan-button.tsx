import { lazy, Suspense, useEffect, useState } from 'react';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useScannedSpare } from '@/shared/client/scanned-spare';
import { missingHere } from '@/shared/client/secure-context';
import { Button } from '@/shared/ui/primitives/button';
import { Txt } from '@/shared/ui/primitives/txt';

// The camera and its decoder come with the first press.
const ScanSheet = lazy(() => import('@/shared/ui/scan/scan-sheet').then((module) => ({ default: module.ScanSheet })));

/** Which spare a label belongs to: its id where the code names it, else its label as it stands there. */
export interface ScannedSpare {
  spareId: string | null;
  label: string;
}

/** Scans the label of a spare. Where the browser opens no camera there is no button: the label is typed. */
export function ScanButton({
  disabled,
  onSpare,
}: {
  disabled?: boolean;
  /** Gives the sentence that says why it cannot be taken; null: it is taken. */
  onSpare: (spare: ScannedSpare) => string | null;
}) {
  const [open, setOpen] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const spareOf = useScannedSpare();
  const [missing] = missingHere(['camera']);
  useEffect(() => {
    if (!open) return undefined;
    // Another page before this one: nobody sees the camera's light any more.
    const hidden = () => {
      if (document.visibilityState === 'hidden') setOpen(false);
    };
    document.addEventListener('visibilitychange', hidden);
    return () => document.removeEventListener('visibilitychange', hidden);
  }, [open]);
  if (missing) return null;
  const read = async (text: string) => {
    setOpen(false);
    try {
      const found = await spareOf(text);
      setProblem(
        found === null ? 'This code is none of a spare’s label. Scan another, or type the label.' : onSpare(found),
      );
    } catch (error) {
      const unknown = isProblem(error) && error.status === 404;
      setProblem(
        unknown ? 'This label is of no charge of this workshop. Type the label of the spare.' : sentenceOf(error),
      );
    }
  };
  return (
    <>
      <Button
        look="line"
        size="small"
        icon="scan"
        title="Scan"
        label="Scan the label of a spare"
        disabled={disabled}
        onPress={() => {
          setProblem(null);
          setOpen(true);
        }}
      />
      {problem ? (
        <Txt kind="label" tone="alarm" role="alert">
          {problem}
        </Txt>
      ) : null}
      {open ? (
        <Suspense fallback={null}>
          <ScanSheet onText={(text) => void read(text)} onClose={() => setOpen(false)} />
        </Suspense>
      ) : null}
    </>
  );
}
