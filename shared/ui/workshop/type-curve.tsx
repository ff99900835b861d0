import { lazy, Suspense, type ReactNode } from 'react';
import { View } from 'react-native';
import { useWatch } from 'react-hook-form';
import { chemistryIds, type ModuleTypeDto } from '@/shared/contract/equipment';
import { readQuantity } from '@/shared/contract/read-quantity';
import { Txt } from '../primitives/txt';
import { Surface } from '../theme/surface';
import { radius } from '../theme/tokens';
import { useBreakpoint } from '../theme/use-breakpoint';
import type { TypedForm } from '../forms/bound';
import type { CurveInput } from './curve-layout';
import type { TypeTexts } from './type-form';

const CurveSource = lazy(() => import('./curve-source').then((part) => ({ default: part.CurveSource })));

const numberIn = (text: string, unit: 'V' | 'Ah'): number | null => {
  const reading = readQuantity(text, { name: '', unit, min: 0, aboveMin: true });
  return reading.ok ? reading.value : null;
};

/** The curve beside the form, drawn from what is typed there. */
export function TypeCurve({
  form,
  own,
  readOnly,
  ownActs,
}: {
  form: TypedForm<TypeTexts>;
  /** The workshop's own curve of this type. */
  own: ModuleTypeDto['ownCurve'];
  readOnly: boolean;
  /** Given what is typed: how an own curve comes in and goes. */
  ownActs: (input: CurveInput) => ReactNode;
}) {
  const wide = useBreakpoint() === 'wide';
  const [chemistry, ratedAh, charge, discharge, floor, shelf] = useWatch({
    control: form.control,
    name: ['chemistry', 'ratedAh', 'chargeLimitVolts', 'dischargeLimitVolts', 'floorVolts', 'shelfVolts'],
  });
  const known = chemistryIds.find((id) => id === chemistry);
  const input = known && {
    chemistry: known,
    ratedAh: numberIn(ratedAh, 'Ah'),
    chargeLimitVolts: numberIn(charge, 'V'),
    dischargeLimitVolts: numberIn(discharge, 'V'),
    floorVolts: numberIn(floor, 'V'),
    shelfVolts: numberIn(shelf, 'V'),
  };
  const content = input ? (
    <Suspense fallback={<View style={{ height: 520 }} />}>
      <CurveSource form={form} input={input} own={own} readOnly={readOnly} ownActs={ownActs(input)} />
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
