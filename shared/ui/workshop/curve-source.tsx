import { useEffect, type ReactNode } from 'react';
import { useWatch } from 'react-hook-form';
import { View } from 'react-native';
import { publishedCurves, type OcvTable } from '@/calc';
import { BoundSelect, type TypedForm } from '../forms/bound';
import { share } from '../format/quantities';
import { Txt } from '../primitives/txt';
import type { CurveInput } from './curve-layout';
import { CurvePicture } from './curve-picture';
import type { TypeTexts } from './type-form';

/**
 * The curve of the type with the choice where it comes from: one that was published, or the workshop's own, which goes
 * before. Loads late: it brings the curves of `calc`.
 */
export function CurveSource({
  form,
  input,
  own,
  readOnly,
  ownActs,
}: {
  form: TypedForm<TypeTexts>;
  input: Omit<CurveInput, 'curve'>;
  own: OcvTable | null;
  readOnly: boolean;
  /** How an own curve comes in and goes; left out for who may not. */
  ownActs: ReactNode;
}) {
  const curveId = useWatch({ control: form.control, name: 'curveId' });
  const published = publishedCurves(input.chemistry);
  const [usual, ...others] = published;
  const chosen = others.find(({ id }) => id === curveId);
  // Another chemistry has other curves: what was chosen of the old one is none of its. The usual one is the empty choice.
  const strange = curveId !== '' && chosen === undefined;
  useEffect(() => {
    if (strange && !readOnly) form.setValue('curveId', '', { shouldDirty: true });
  }, [strange, readOnly, form]);
  return (
    <View style={{ rowGap: 16 }}>
      <CurvePicture {...input} curve={own ?? chosen?.curve ?? null} />
      {own ? (
        <Txt>{`Own curve, ${own.soc.length} points from ${share(own.soc[0] ?? 0)} to ${share(own.soc.at(-1) ?? 1)} of charge. It goes before the published ones.`}</Txt>
      ) : (
        <View style={{ rowGap: 4, maxWidth: 420 }}>
          <BoundSelect
            form={form}
            name="curveId"
            label="Curve"
            options={[
              { value: '', label: usual ? `The usual one: ${usual.name}` : 'The usual one' },
              ...others.map(({ id, name }) => ({ value: id, label: name })),
            ]}
            readOnly={readOnly}
          />
          <Txt kind="small" tone="ink2">
            {`Source: ${(chosen ?? usual)?.source ?? 'see the sources of the calculation'}.`}
          </Txt>
        </View>
      )}
      {ownActs}
    </View>
  );
}
