import type { OddSeen } from '@/calc/live-types';

/**
 * What to check first where a reading cannot be explained, as the rest of a sentence: the alert and the call-out say the same.
 *
 * @param channel what the charge hangs on: 'A2', 'the charger'
 */
export function oddCheckFirst({ kind, group }: Pick<OddSeen, 'kind' | 'group'>, channel: string): string {
  const place = group === null ? 'the groups' : `group ${group + 1}`;
  switch (kind) {
    case 'voltage-jump':
      return 'the clips and how they hold, then the leads.';
    case 'no-current':
      return `whether ${channel} is on, then the clips, then its set voltage.`;
    case 'stuck-current':
      return `warmth at ${place}, then what ${channel} is set to, then the clips.`;
    case 'group-ahead':
      return `warmth at ${place}, then the meter tip on its tab, then its busbar.`;
    case 'too-warm':
      return 'where it is warmest, then the clips there. Hold the charge where it rises on.';
    case 'unexplained':
      return 'the reading itself, then the clips, then the set voltage.';
  }
}
