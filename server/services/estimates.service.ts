import { quickEstimate } from '@/calc/index';
import type { EstimateDto, EstimateInput } from '@/shared/contract/estimate';

/**
 * The quick estimate for others than our own screens, which compute it themselves with the same function.
 *
 * It has no caution that nobody noted the meter, which a plan has: an estimate asks for no meter, so none was forgotten.
 */
export const estimate = (input: EstimateInput): EstimateDto => quickEstimate(input);
