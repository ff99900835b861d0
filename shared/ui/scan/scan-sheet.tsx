import { useState } from 'react';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { CameraView } from './camera-view';

/** The camera over the page, until a code was read or it is closed. Loaded late. */
export function ScanSheet({ onText, onClose }: { onText: (text: string) => void; onClose: () => void }) {
  const [problem, setProblem] = useState<string | null>(null);
  const [turn, setTurn] = useState(0);
  return (
    <BottomSheet
      open
      title="Scan a label"
      onClose={onClose}
      actions={
        <>
          {problem ? (
            <Button
              look="line"
              title="Try again"
              onPress={() => {
                setProblem(null);
                setTurn((last) => last + 1);
              }}
            />
          ) : null}
          <Button title="Type it instead" onPress={onClose} />
        </>
      }
    >
      {problem ? (
        <Txt role="alert">{problem}</Txt>
      ) : (
        <>
          <CameraView key={turn} onText={onText} onProblem={setProblem} />
          <Txt tone="ink2">Hold the code of the label into the picture.</Txt>
        </>
      )}
    </BottomSheet>
  );
}
