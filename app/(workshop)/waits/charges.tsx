import { useGate } from '@/shared/client/gate';
import { ChargesPage } from '@/shared/screens/waits/charges-page';
import { WaitsForbidden } from '@/shared/screens/waits/waits-forbidden';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** The charges behind a number of the waits. */
export default function WaitCharges() {
  const gate = useGate('waits:read');
  return gate.may ? <ChargesPage /> : <WaitsForbidden {...gate} />;
}
