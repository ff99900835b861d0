import { Children, type ReactNode } from 'react';
import { View } from 'react-native';
import { Txt } from '../primitives/txt';
import { useBreakpoint } from '../theme/use-breakpoint';

/** Short fields side by side: two on the phone, three wider; `two` keeps two everywhere. */
export function FieldGrid({ children, two = false }: { children: ReactNode; two?: boolean }) {
  const phone = useBreakpoint() === 'phone';
  const columns = two || phone ? 2 : 3;
  // Padding instead of a gap, so that the share of each field is exact and a lone last one stays as wide as the others.
  return (
    <View style={{ flexDirection: 'row', flexWrap: 'wrap', marginHorizontal: -7, rowGap: 12 }}>
      {Children.toArray(children).map((child, index) => (
        <View key={index} style={{ width: `${100 / columns}%`, paddingHorizontal: 7 }}>
          {child}
        </View>
      ))}
    </View>
  );
}

/** A titled part of a form. */
export function FormPart({ title, note, children }: { title: string; note?: string; children: ReactNode }) {
  return (
    <View role="group" aria-label={title} style={{ rowGap: 12 }}>
      <View>
        <Txt kind="heading" heading={2}>
          {title}
        </Txt>
        {note ? (
          <Txt kind="small" tone="ink2">
            {note}
          </Txt>
        ) : null}
      </View>
      {children}
    </View>
  );
}
