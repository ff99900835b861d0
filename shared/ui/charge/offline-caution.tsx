import type { ChargeDto } from '@/shared/contract/charge';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Caution } from '../primitives/call-out';

/** Without a connection: what does not reach this device, and what to do meanwhile. */
export function OfflineCaution({ charge, now, device }: { charge: ChargeDto; now: number; device: string }) {
  const { zone, marks } = useFormats();
  const next = charge.nextLookInAt === null ? null : moment(Date.parse(charge.nextLookInAt), zone, now, marks);
  return (
    <Caution>
      {`Alerts do not reach this ${device} now. Stay with the charge${next === null ? '' : `, and look in at ${next}`}. To stop, switch off at the charger and note it here afterwards.`}
    </Caution>
  );
}
