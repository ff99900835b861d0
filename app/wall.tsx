import { useState } from 'react';
import { useKeptApp } from '@/shared/client/build-offer';
import { useNow } from '@/shared/client/clock';
import { useAwake } from '@/shared/client/keep-awake';
import { useHeardAt } from '@/shared/client/link';
import { useNewBuildReload, useWallBoard, useWallLive, useWallMe, useWallPairing } from '@/shared/client/wall-screen';
import { FormatsProvider } from '@/shared/ui/format/formats';
import { ThemeProvider } from '@/shared/ui/theme/theme';
import { burnInShift } from '@/shared/ui/wall/wall-link';
import { WallPairing } from '@/shared/ui/wall/wall-pairing';
import { WallScreen } from '@/shared/ui/wall/wall-screen';
import { WallStage } from '@/shared/ui/wall/wall-stage';

export { ErrorBoundary } from '@/shared/ui/wall/wall-error';

/** A screen on the wall: shows a code until somebody lets it read a board, then the board for ever. */
export default function Wall() {
  const me = useWallMe();
  const now = useNow(1000);
  useNewBuildReload();
  return (
    <ThemeProvider choice="night">
      <WallStage shift={burnInShift(now)}>
        {me.data ? <Board zone={me.data.workshop.zone} /> : me.data === null ? <Pairing /> : <Starting />}
      </WallStage>
    </ThemeProvider>
  );
}

function Board({ zone }: { zone: string }) {
  const now = useNow(1000);
  const [since] = useState(now);
  const board = useWallBoard(true);
  const awake = useAwake();
  useWallLive(true);
  useKeptApp();
  return (
    <FormatsProvider languageTag={navigator.language} zone={board.data?.workshop.zone ?? zone}>
      <WallScreen
        board={board.data ?? null}
        heardAt={useHeardAt()}
        since={since}
        now={now}
        note={awake.state === 'off' ? 'this screen may fall asleep' : null}
      />
    </FormatsProvider>
  );
}

/** Paired once, and the server is away while it starts. */
function Starting() {
  const now = useNow(1000);
  const [since] = useState(now);
  return <WallScreen board={null} heardAt={useHeardAt()} since={since} now={now} />;
}

function Pairing() {
  const now = useNow(1000);
  const awake = useAwake();
  const state = useWallPairing(true);
  const code = state.kind === 'code' ? state.code : null;
  return (
    <WallPairing
      code={code?.userCode ?? null}
      word={words[state.kind]}
      address={code?.verificationUrlComplete ?? null}
      changesAt={code ? Date.parse(code.expiresAt) : null}
      now={now}
      notes={awake.sentence ? [awake.sentence] : []}
    />
  );
}

const words = {
  asking: 'Asking for a code.',
  code: 'This screen wants to show a board. Its code is',
  refused: 'This screen was refused. A new code comes.',
  unheard: 'No word from the server. It is asked again by itself.',
  paired: 'Let in. The board comes.',
} as const;
