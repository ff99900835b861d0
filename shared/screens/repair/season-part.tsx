import { useState } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useRepairSeason } from '@/shared/client/repair-season';
import { seasonPartNames } from '@/shared/contract/repair-season';
import { Button } from '@/shared/ui/primitives/button';
import { Txt } from '@/shared/ui/primitives/txt';
import { SeasonPicture } from '@/shared/ui/repair/season-picture';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';

/** Where the time of the repair went. Reckoned when somebody asks: the page is opened for its next step far more often. */
export function SeasonPart({ repairId }: { repairId: string }) {
  const [wanted, setWanted] = useState(false);
  const season = useRepairSeason(repairId, wanted);
  return (
    <View style={{ rowGap: 8 }}>
      <Txt kind="heading" heading={2}>
        Where its time went
      </Txt>
      {!wanted ? (
        <View style={{ alignItems: 'flex-start' }}>
          <Button look="line" size="small" title="Show the whole repair" onPress={() => setWanted(true)} />
        </View>
      ) : season.data ? (
        <SeasonPicture season={season.data} names={seasonPartNames} />
      ) : season.isError ? (
        <ErrorState
          failed="The time of the repair could not be read."
          toDo={sentenceOf(season.error)}
          action={{ title: 'Try again', onPress: () => void season.refetch(), busy: season.isFetching }}
        />
      ) : (
        <Loading what="the time of the repair" onRetry={() => void season.refetch()} />
      )}
    </View>
  );
}
