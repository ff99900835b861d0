import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useMemo, useState } from 'react';
import { View } from 'react-native';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useCharge } from '@/shared/client/charges';
import { useLink } from '@/shared/client/link';
import { useSaveLabel } from '@/shared/client/papers';
import { missingHere } from '@/shared/client/secure-context';
import type { ChargeDto } from '@/shared/contract/charge';
import { labelSize } from '@/shared/contract/label-layout';
import { labelOf, noLabelReason } from '@/shared/contract/label-words';
import { ChargeMissing } from '@/shared/ui/charge/charge-missing';
import { useFormats } from '@/shared/ui/format/formats';
import { labelForms } from '@/shared/ui/label/label-forms';
import { LabelSheet } from '@/shared/ui/label/label-sheet';
import { printNow, PrintSheet } from '@/shared/ui/label/print-sheet';
import { Button } from '@/shared/ui/primitives/button';
import { Txt } from '@/shared/ui/primitives/txt';
import { Foot } from '@/shared/ui/screen/foot';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const offlineNote = 'No connection: the PDF is drawn when it is back.';

/** The label of a proven module, to be printed and stuck on it. */
export default function Label() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const query = useCharge(id);
  const charge = query.data;
  const back = () => (router.canGoBack() ? router.back() : router.replace(`/charges/${id}` as Href));
  const why = charge ? noLabelReason(charge) : null;
  const may = charge !== undefined && why === null;
  const { marks } = useFormats();
  const offline = useLink().state === 'down';
  const paper = useSaveLabel(id, charge?.spare.label ?? id);
  const note = why ?? (paper.error ? sentenceOf(paper.error) : offline && may ? offlineNote : null);
  return (
    <Screen
      single
      header={
        <HeaderBar title="Label" sub={charge && `${charge.title} · ${charge.spare.label} · 62 × 40 mm`} onBack={back} />
      }
      foot={
        <Foot note={note ?? undefined} noteId="label-note">
          <Button
            look="line"
            title="Label as PDF"
            icon="download"
            onPress={() => paper.save(marks.decimal)}
            busy={paper.isPending}
            disabled={!may || offline}
            describedBy={note ? 'label-note' : undefined}
          />
          <Button
            title="Print the label"
            icon="print"
            onPress={printNow}
            disabled={!may}
            describedBy={why ? 'label-note' : undefined}
          />
        </Foot>
      }
    >
      {!charge ? (
        <ChargeMissing
          gone={isProblem(query.error) && query.error.status === 404}
          problem={query.isError ? sentenceOf(query.error) : null}
          busy={query.isFetching}
          onRetry={() => void query.refetch()}
          onBack={back}
        />
      ) : may ? (
        <Preview charge={charge} />
      ) : null}
    </Screen>
  );
}

function Preview({ charge }: { charge: ChargeDto }) {
  const { zone, marks } = useFormats();
  const [width, setWidth] = useState(0);
  const [missing] = missingHere(['camera']);
  const label = useMemo(() => labelOf(charge, labelForms(zone, marks)), [charge, zone, marks]);
  return (
    <View style={{ rowGap: 12, paddingTop: 8 }}>
      <View onLayout={({ nativeEvent }) => setWidth(Math.round(nativeEvent.layout.width))}>
        {width > 0 ? <LabelSheet label={label} url={charge.labelUrl} width={width} /> : null}
      </View>
      <Txt kind="small" tone="ink2">
        The code opens this charge. In the print sheet choose the label printer, 62 × 40 mm, without margins.
      </Txt>
      {missing ? (
        <Txt kind="small" tone="ink2">
          {`${missing.sentence} ${charge.spare.label} finds it in Spares.`}
        </Txt>
      ) : null}
      <PrintSheet widthMm={labelSize.width} heightMm={labelSize.height}>
        <LabelSheet label={label} url={charge.labelUrl} width="62mm" />
      </PrintSheet>
    </View>
  );
}
