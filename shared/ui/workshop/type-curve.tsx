import { lazy, Suspense } from 'react';
import { View } from 'react-native';
import { useWatch } from 'react-hook-form';
import { chemistryIds } from '@/shared/contract/equipment';
import { readQuantity } from '@/shared/contract/quantity';
import { Txt } from '../primitives/txt';
import { Surface } from '../theme/surface';
import { radius } from '../theme/tokens';
import { useBreakpoint } from '../theme/use-breakpoint';
import type { TypedForm } from '../forms/bound';
import type { TypeTexts } from './type-form';

const CurvePicture = lazy(() => import('./curve-picture').then((part) => ({ default: part.CurvePicture })));

const numberIn = (text: string, unit: 'V' | 'Ah'): number | null => {
  const reading = readQuantity(text, { name: '', unit, min: 0, aboveMin: true });
  return reading.ok ? reading.value : null;
};

/** The curve beside the form, drawn from what is typed there. */
export function TypeCurve({ form }: { form: TypedForm<TypeTexts> }) {
  const wide = useBreakpoint() === 'wide';
  const [chemistry, ratedAh, charge, discharge, floor, shelf] = useWatch({
    control: form.control,
    name: ['chemistry', 'ratedAh', 'chargeLimitVolts', 'dischargeLimitVolts', 'floorVolts', 'shelfVolts'],
  });
  const known = chemistryIds.find((id) => id === chemistry);
  const content = known ? (
    <Suspense fallback={<View style={{ height: 520 }} />}>
      <CurvePicture
        chemistry={known}
        ratedAh={numberIn(ratedAh, 'Ah')}
        chargeLimitVolts={numberIn(charge, 'V')}
        dischargeLimitVolts={numberIn(discharge, 'V')}
        floorVolts={numberIn(floor, 'V')}
        shelfVolts={numberIn(shelf, 'V')}
      />
    </Suspense>
  ) : (
    <Txt tone="ink2">Choose the chemistry, and its curve is drawn here with your limits.</Txt>
  );
  return wide ? (
    <Surface tone="sheet" style={{ borderRadius: radius.sheet, padding: 20 }}>
      {content}
    </Surface>
  ) : (
    content
  );
}
