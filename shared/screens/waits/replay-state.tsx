import { View } from 'react-native';
import type { ReplayJobDto } from '@/shared/contract/waits-replay';
import { Button } from '@/shared/ui/primitives/button';
import { StatusRegion } from '@/shared/ui/primitives/live-region';
import { Txt } from '@/shared/ui/primitives/txt';
import { share } from '@/shared/ui/format/quantities';

/** How far a calculation is, the way to end it, and what went wrong. */
export function ReplayState({
  replay,
}: {
  replay: { job: ReplayJobDto | undefined; problem: string | null; cancel: (() => void) | null };
}) {
  const { job, problem, cancel } = replay;
  return (
    <>
      {cancel && job ? (
        <View style={{ flexDirection: 'row', alignItems: 'center', columnGap: 16, justifyContent: 'space-between' }}>
          <Txt tone="ink2">
            {job.state === 'queued' ? 'Another calculation goes first.' : `Replayed so far: ${share(job.progress)}`}
          </Txt>
          <Button look="line" size="small" title="Cancel the replay" onPress={cancel} />
        </View>
      ) : null}
      <StatusRegion text={job?.state === 'done' ? 'The replay is done.' : cancel ? 'Replaying the charges' : ''} />
      {job?.state === 'cancelled' ? <Txt tone="ink2">Cancelled. Nothing was changed.</Txt> : null}
      {problem ? (
        <Txt tone="alarm" role="alert">
          {problem}
        </Txt>
      ) : null}
    </>
  );
}
