import { useMutation } from '@tanstack/react-query';
import type { PaperQuery } from '@/shared/contract/papers';
import { api } from './api';
import { daySheetPath } from './bench-plan';
import { saveFile } from './save-file';

/** Where sheets are Letter and not A4. */
const letterRegions = new Set(['US', 'CA', 'MX', 'CL', 'CO', 'VE', 'PH', 'GT', 'CR', 'PA', 'DO', 'PR']);

/** Size of paper and decimal mark for a language tag ('en-US', 'de-DE'). */
export function paperFor(languageTag: string, decimal: '.' | ','): PaperQuery {
  const region = /-([A-Z]{2})(?:-|$)/.exec(languageTag)?.[1] ?? '';
  return { paper: letterRegions.has(region) ? 'letter' : 'a4', decimal: decimal === ',' ? 'comma' : 'point' };
}

/** Fetches a PDF and saves it on this device. */
const useSavePaper = () =>
  useMutation({
    mutationFn: async ({ path, name, query }: { path: string; name: string; query: PaperQuery & { day?: string } }) =>
      saveFile(await api.blob(path, { query: { ...query } }), name),
  });

/** The hand-over sheet of a repair. */
export function useSaveHandOver(repair: { id: string; number: string }) {
  const { mutate, ...state } = useSavePaper();
  return {
    ...state,
    save: (decimal: '.' | ',') =>
      mutate({
        path: `/repairs/${repair.id}/hand-over.pdf`,
        name: `hand-over-${repair.number}.pdf`,
        query: paperFor(navigator.language, decimal),
      }),
  };
}

/** The label of a proven module; refused with the reason where it is not in tolerance. */
export function useSaveLabel(chargeId: string, name: string) {
  const { mutate, ...state } = useSavePaper();
  return {
    ...state,
    save: (decimal: '.' | ',') =>
      mutate({
        path: `/charges/${chargeId}/label.pdf`,
        name: `label-${name}.pdf`,
        query: { decimal: decimal === ',' ? 'comma' : 'point' },
      }),
  };
}

/** The day sheet of the bench: who does what when, and the charges of each channel. */
export function useSaveDaySheet(day: string) {
  const { mutate, ...state } = useSavePaper();
  return {
    ...state,
    save: (decimal: '.' | ',') =>
      mutate({
        path: daySheetPath,
        name: `day-sheet-${day}.pdf`,
        query: { ...paperFor(navigator.language, decimal), day },
      }),
  };
}
