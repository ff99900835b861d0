import { useQueryClient } from '@tanstack/react-query';
import { scannedOf } from '@/shared/contract/scanned';
import { chargeQuery } from './charges';
import { spareQuery } from './spares';

/**
 * Finds the spare that a scanned code belongs to: by its charge, by its own address, or by its label as a text.
 * @returns a function that gives null where the code is no label; it throws ApiProblem where the charge is unknown
 */
export function useScannedSpare() {
  const client = useQueryClient();
  return async (text: string): Promise<{ spareId: string | null; label: string } | null> => {
    const scanned = scannedOf(text);
    switch (scanned.kind) {
      case 'charge': {
        const { spare } = await client.fetchQuery(chargeQuery(scanned.id));
        return { spareId: spare.id, label: spare.label };
      }
      case 'spare': {
        const { id, label } = await client.fetchQuery(spareQuery(scanned.id));
        return { spareId: id, label };
      }
      case 'label':
        return { spareId: null, label: scanned.label };
      case 'nothing':
        return null;
    }
  };
}

/** Whether a scanned spare is this one: by its id, else by its label in whatever case. */
export const isScanned = (
  scanned: { spareId: string | null; label: string },
  spare: { id: string; label: string },
): boolean =>
  scanned.spareId === null ? spare.label.toLowerCase() === scanned.label.toLowerCase() : spare.id === scanned.spareId;
