/** Reads the typed numbers of the quick estimate by the contract. Loaded after the first paint: it brings the schema. */
import { estimateSchema, type EstimateInput } from '@/shared/contract/estimate';
import type { EstimateField, EstimateTyped } from './estimate-typed';

export interface EstimateRead {
  /** Null where a number is missing or wrong. */
  input: EstimateInput | null;
  /** The sentence at each such field. */
  errors: Partial<Record<EstimateField, string>>;
}

export function readEstimate(typed: EstimateTyped): EstimateRead {
  const read = estimateSchema.safeParse(typed);
  if (read.success) return { input: read.data, errors: {} };
  const errors: EstimateRead['errors'] = {};
  for (const issue of read.error.issues) errors[String(issue.path[0]) as EstimateField] ??= issue.message;
  return { input: null, errors };
}
