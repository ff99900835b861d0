import { View } from 'react-native';
import { alertLevels } from '@/shared/contract/alert';
import { alertKindNames } from '@/shared/contract/alert-kinds';
import type { AlertCause, AlertSettingsDto } from '@/shared/contract/alert-settings';
import { MoreGroup, MoreRow } from '../more/more-row';
import { levelTitles, waysText } from './way-words';

/** Every cause with where it goes, the most urgent level first. A row opens its choice. */
export function CauseList({
  ways,
  onChoose,
}: {
  ways: AlertSettingsDto['ways'];
  onChoose: (cause: AlertCause) => void;
}) {
  return (
    <View>
      {[...alertLevels].reverse().map((level) => (
        <MoreGroup key={level} title={levelTitles[level]}>
          {ways
            .filter((cause) => cause.level === level)
            .map((cause) => (
              <MoreRow
                key={cause.kind}
                title={alertKindNames[cause.kind]}
                meaning={waysText(cause.ways)}
                onPress={() => onChoose(cause)}
              />
            ))}
        </MoreGroup>
      ))}
    </View>
  );
}
