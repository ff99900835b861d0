import { quickEstimate } from '@/calc/index';
import type { EstimateDto, EstimateInput } from '@/shared/contract/estimate';

/** The quick estimate for others than our own screens, which compute it themselves with the same function. */
export const estimate = (input: EstimateInput): EstimateDto => quickEstimate(input);
