import { View } from 'react-native';
import { useMeters } from '@/shared/client/meters';
import { isScanned } from '@/shared/client/scanned-spare';
import { useWorkshop } from '@/shared/client/workshop';
import { PlanFields } from '@/shared/ui/plan/plan-fields';
import { PlanSummary } from '@/shared/ui/plan/plan-summary';
import type { PlanTyped } from '@/shared/ui/plan/plan-typed';
import { Link } from '@/shared/ui/primitives/link';
import { Txt } from '@/shared/ui/primitives/txt';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import { ScanButton } from '../scan/scan-button';
import type { PlanPage } from './use-plan-page';

/** From spare to pack: in a few lines, or as fields. */
export function PlanFacts({ page, onChange }: { page: PlanPage; onChange: (change: Partial<PlanTyped>) => void }) {
  const { typed, spare, settled, dto, now, refused, open, request } = page;
  const wide = useBreakpoint() === 'wide';
  const meters = useMeters();
  const workshop = useWorkshop();
  const clear = () => {
    page.clearDraft();
    page.choose(null);
    page.setOpen(true);
  };
  return (
    <View style={{ rowGap: 14 }}>
      {wide ? (
        <Txt kind="heading" heading={2}>
          From spare to pack
        </Txt>
      ) : null}
      {spare && !(refused && !wide) ? <PlanSummary spare={spare} request={settled} dto={dto} now={now} /> : null}
      {open ? (
        <PlanFields
          typed={typed}
          errors={page.errors}
          spares={page.spares?.filter((other) => other.where !== 'fitted')}
          meters={meters.data}
          today={page.today}
          toleranceHint={workshop.data ? String(workshop.data.toleranceMillivolts) : ''}
          chemistry={page.chemistry}
          scan={
            <ScanButton
              onSpare={(scanned) => {
                const found = page.spares?.find((one) => one.where !== 'fitted' && isScanned(scanned, one));
                if (!found) return `${scanned.label} is not in stock here. Scan another, or choose the spare.`;
                onChange({ spareId: found.id });
                page.leave('spareId');
                return null;
              }}
            />
          }
          onChange={onChange}
          onLeave={page.leave}
        />
      ) : null}
      <View style={{ flexDirection: 'row', justifyContent: 'space-between', marginVertical: -8 }}>
        {request !== null ? (
          <Link
            kind="small"
            title={open ? 'fold away' : 'change spare, target or times'}
            onPress={() => page.setOpen(!open)}
          />
        ) : (
          <View />
        )}
        {page.restored ? <Link kind="small" align="right" title="clear what was typed before" onPress={clear} /> : null}
      </View>
    </View>
  );
}
