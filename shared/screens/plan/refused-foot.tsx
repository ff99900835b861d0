import type { SpareDto } from '@/shared/contract/spare';
import { Button } from '@/shared/ui/primitives/button';
import { ButtonRow, Foot } from '@/shared/ui/screen/foot';

/** What can be done about a spare that is ruled out: set it aside, plan with another. */
export function RefusedFoot({
  spare,
  next,
  onQuarantine,
  onTake,
}: {
  spare: SpareDto | null;
  /** The soonest of the other spares. */
  next: SpareDto | null;
  onQuarantine: () => void;
  onTake: (spareId: string) => void;
}) {
  const aside = spare?.where === 'quarantine';
  if (aside && !next) return undefined;
  return (
    <Foot>
      <ButtonRow>
        {aside ? null : <Button title="Quarantine" look="line" grow={!next} onPress={onQuarantine} />}
        {next ? <Button title={`Plan with ${next.label}`} grow onPress={() => onTake(next.id)} /> : null}
      </ButtonRow>
    </Foot>
  );
}
