import { render, screen } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import type { ChargePlan } from '@/calc/plan-types';
import { HowFarToTrustIt } from '@/shared/ui/plan/plan-trust';
import { option } from '../charge/charges';

const plan = { cautions: [] } as unknown as ChargePlan;

describe('how far to trust a way', () => {
  it('names the number that makes most of the band and says that measuring it would narrow it by 40 min', () => {
    render(<HowFarToTrustIt option={{ ...option, dominant: 'capacity', narrowsByS: 2400 }} plan={plan} />);
    expect(document.body.textContent?.replaceAll('\u00a0', ' ')).toContain(
      'Most of the band comes from the spare’s capacity. Measuring the capacity would narrow it by 40 min.',
    );
  });

  it('promises nothing where less than a minute would be gained', () => {
    render(<HowFarToTrustIt option={{ ...option, narrowsByS: 40 }} plan={plan} />);
    expect(screen.queryByText(/would narrow/)).toBeNull();
  });
});
