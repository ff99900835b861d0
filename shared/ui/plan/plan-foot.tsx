import { View } from 'react-native';
import { Button } from '../primitives/button';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';

/** The next step of a plan, the quiet one beside it, and over them why it cannot be taken. */
export function PlanActs({
  problem,
  holder,
  note,
  disabled,
  busy,
  later,
  onChecks,
  onLater,
}: {
  /** Red and read out. */
  problem: string | null;
  /** The charge that has taken the spare meanwhile, and the way to it. */
  holder: { title: string; onOpen: () => void } | null;
  note: string | null;
  disabled: boolean;
  busy: boolean;
  /** 'Keep for later', or with the time it is queued for. */
  later: string;
  onChecks: () => void;
  onLater: () => void;
}) {
  return (
    <View>
      <View nativeID="plan-note">
        {problem ? (
          <Txt kind="label" tone="alarm" role="alert" style={{ marginBottom: 6 }}>
            {problem}
          </Txt>
        ) : null}
        {holder ? <Link kind="small" tight title={`Open the charge ${holder.title}`} onPress={holder.onOpen} /> : null}
        {note ? (
          <Txt kind="small" tone="ink2" style={{ marginBottom: 6 }}>
            {note}
          </Txt>
        ) : null}
      </View>
      <Button
        title="Checks before clipping on"
        disabled={disabled}
        busy={busy}
        describedBy="plan-note"
        onPress={onChecks}
      />
      <View style={{ alignItems: 'center', marginBottom: -10 }}>
        <Link title={later} disabled={disabled || busy} onPress={onLater} />
      </View>
    </View>
  );
}
