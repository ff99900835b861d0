import { useGate } from '@/shared/client/gate';
import { WaitsForbidden } from '@/shared/screens/waits/waits-forbidden';
import { WaitsPage } from '@/shared/screens/waits/waits-page';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Where the hours of waiting go. */
export default function Waits() {
  const gate = useGate('waits:read');
  return gate.may ? <WaitsPage /> : <WaitsForbidden {...gate} />;
}
