import { useDeleteRepair, useSetReadingAside } from '@/shared/client/repairs';
import { readingName, type PackReadingDto } from '@/shared/contract/pack-reading';
import type { RepairDto, RepairPageDto, RepairWaitDto } from '@/shared/contract/repair';
import { FitSheet } from './fit-sheet';
import { HandOverSheet } from './hand-over-sheet';
import { ReasonSheet } from './reason-sheet';
import { RemovedSheet } from './removed-sheet';
import { WaitSheet } from './wait-sheet';

/** The sheet that is open over a repair's page, with what it is about. */
export type OpenSheet =
  | { kind: 'hand-over' | 'removed' | 'fit' | 'delete' }
  | { kind: 'wait'; wait: RepairWaitDto }
  | { kind: 'set-aside'; reading: PackReadingDto };

export function RepairSheets({
  repair,
  sheet,
  now,
  onClose,
}: {
  repair: RepairPageDto;
  sheet: OpenSheet;
  now: number;
  onClose: () => void;
}) {
  switch (sheet.kind) {
    case 'hand-over':
      return <HandOverSheet repair={repair} onClose={onClose} />;
    case 'removed':
      return <RemovedSheet repair={repair} onClose={onClose} />;
    case 'fit':
      return <FitSheet repair={repair} onClose={onClose} />;
    case 'wait':
      return <WaitSheet repair={repair} wait={sheet.wait} now={now} onClose={onClose} />;
    case 'delete':
      return <DeleteSheet repair={repair} onClose={onClose} />;
    case 'set-aside':
      return <AsideSheet repair={repair} reading={sheet.reading} onClose={onClose} />;
  }
}

function DeleteSheet({ repair, onClose }: { repair: RepairDto; onClose: () => void }) {
  const remove = useDeleteRepair();
  return (
    <ReasonSheet
      title={`Delete ${repair.number}`}
      fact="It leaves the lists. A manager can bring it back from the deleted ones."
      confirm="Delete the repair"
      safe="Keep it"
      draft={`repair.delete.${repair.id}`}
      busy={remove.isPending}
      error={remove.error}
      onConfirm={(reason, done) => remove.mutate({ id: repair.id, reason }, { onSuccess: done })}
      onClose={onClose}
    />
  );
}

function AsideSheet({ repair, reading, onClose }: { repair: RepairDto; reading: PackReadingDto; onClose: () => void }) {
  const aside = useSetReadingAside();
  return (
    <ReasonSheet
      title={`Set the reading aside: ${readingName(reading)}`}
      fact="It stays, struck through, and nothing is reckoned from it any more. Steps that stood on it begin anew."
      confirm="Set it aside"
      safe="Keep it"
      draft={`repair.aside.${reading.id}`}
      busy={aside.isPending}
      error={aside.error}
      onConfirm={(reason, done) => aside.mutate({ id: repair.id, readingId: reading.id, reason }, { onSuccess: done })}
      onClose={onClose}
    />
  );
}
