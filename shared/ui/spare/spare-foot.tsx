import { View } from 'react-native';
import type { SpareDto } from '@/shared/contract/spare';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { ButtonRow, Foot } from '../screen/foot';

export type SpareAct = 'quarantine' | 'release' | 'reading' | 'charge';

/** Why it cannot be quarantined or read here now; null: it can. */
export function blockedBecause(spare: SpareDto): string | null {
  if (spare.where === 'fitted') return `${spare.label} was fitted. Its readings are closed.`;
  if (spare.where !== 'charge' || !spare.charge) return null;
  if (spare.charge.stage === 'planned' || spare.charge.stage === 'queued') return null;
  return `${spare.label} is on ${spare.charge.title}. Log its readings there; stopping it there can set the quarantine.`;
}

/** The foot of a spare's page. */
export function SpareFoot({
  spare,
  releasers,
  offline,
  problem,
  onAct,
}: {
  spare: SpareDto;
  /** Null: this person may release. Else who can: 'a foreman or a manager (Hella)'. */
  releasers: string | null;
  offline: boolean;
  problem: string | null;
  onAct: (act: SpareAct) => void;
}) {
  const blocked = blockedBecause(spare);
  const aside = spare.where === 'quarantine';
  const note = offline
    ? 'No connection: quarantine and readings wait until it is back.'
    : (blocked ?? (aside && releasers ? `It is released by ${releasers}.` : null));
  const running = blocked !== null && spare.where === 'charge';
  return (
    <Foot
      noteId="spare-note"
      note={
        note || problem ? (
          <View style={{ rowGap: 4 }}>
            {problem ? (
              <Txt kind="small" tone="alarm" role="alert">
                {problem}
              </Txt>
            ) : null}
            {note ? (
              <Txt kind="small" tone="ink2">
                {note}
              </Txt>
            ) : null}
          </View>
        ) : undefined
      }
    >
      <ButtonRow>
        {aside ? (
          <Button
            title="Release"
            look="line"
            disabled={offline || releasers !== null}
            describedBy="spare-note"
            onPress={() => onAct('release')}
          />
        ) : (
          <Button
            title="Quarantine"
            look="line"
            disabled={offline || blocked !== null}
            describedBy="spare-note"
            onPress={() => onAct('quarantine')}
          />
        )}
        {running ? (
          <Button title="Open the charge" grow onPress={() => onAct('charge')} />
        ) : (
          <Button
            title="Enter a reading"
            grow
            disabled={offline || blocked !== null}
            describedBy="spare-note"
            onPress={() => onAct('reading')}
          />
        )}
      </ButtonRow>
    </Foot>
  );
}
