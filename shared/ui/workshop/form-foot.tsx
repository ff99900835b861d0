import type { ReactNode } from 'react';
import { Button } from '../primitives/button';
import { ProblemLine } from '../auth/problem-line';
import { Foot } from '../screen/foot';

/** The foot of a settings form: why it was not taken, then the one next step. */
export function FormFoot({
  title,
  busy,
  wrong,
  problem,
  note,
  disabled = false,
  onPress,
}: {
  title: string;
  busy: boolean;
  /** 'One field needs a change.' */
  wrong: string | null;
  problem: string | null;
  note?: ReactNode;
  disabled?: boolean;
  onPress: () => void;
}) {
  const words = problem ? <ProblemLine text={problem} /> : (wrong ?? note);
  return (
    <Foot note={words}>
      <Button title={title} busy={busy} disabled={disabled} onPress={onPress} />
    </Foot>
  );
}
