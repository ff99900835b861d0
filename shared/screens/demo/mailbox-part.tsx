import { useState } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useLink } from '@/shared/client/link';
import { useDemoPhone } from '@/shared/client/mailbox';
import type { SentWay } from '@/shared/contract/alert-settings';
import type { MailboxDto } from '@/shared/contract/mailbox';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { moment } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { MailboxEntry } from '@/shared/ui/mailbox/mailbox-entry';
import { Button } from '@/shared/ui/primitives/button';
import { Link } from '@/shared/ui/primitives/link';
import { SegmentSwitch } from '@/shared/ui/primitives/segment-switch';
import { Txt } from '@/shared/ui/primitives/txt';
import { Empty } from '@/shared/ui/states/empty';

const shown: { value: SentWay | 'all'; label: string }[] = [
  { value: 'all', label: 'All' },
  { value: 'e-mail', label: 'E-mail' },
  { value: 'browser-push', label: 'Browser' },
  { value: 'phone-push', label: 'Phone' },
];

/** What was sent, by one way or by all, and what it takes to get more of it. */
export function MailboxPart({
  mailbox: { since, entries, hasPhone },
  stale,
  onGo,
}: {
  mailbox: MailboxDto;
  /** Why it could not be read anew; null: it was. */
  stale: string | null;
  onGo: (path: string) => void;
}) {
  const [way, setWay] = useState<SentWay | 'all'>('all');
  const phone = useDemoPhone();
  const now = useNow(30_000);
  const { zone, marks } = useFormats();
  const offline = useLink().state === 'down';
  const of = (value: SentWay | 'all') => entries.filter((entry) => value === 'all' || entry.way === value);
  const seen = of(way);
  return (
    <View style={{ rowGap: 12 }}>
      <Txt tone="ink2">
        {`Nothing of the demo leaves this machine: its letters and pushes come here, the newest first. Kept since the server’s start, ${moment(Date.parse(since), zone, now, marks)}.`}
      </Txt>
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', columnGap: 24 }}>
        <Link title="Where your alerts go" href="/me/alerts" onPress={() => onGo('/me/alerts')} />
        {hasPhone ? (
          <Txt tone="ink2">You have a phone of the demo.</Txt>
        ) : (
          <Button
            look="line"
            size="small"
            title="Give me a phone of the demo"
            busy={phone.isPending}
            disabled={offline}
            describedBy={offline ? 'phone-offline' : undefined}
            onPress={() => phone.mutate()}
          />
        )}
      </View>
      {offline && !hasPhone ? (
        <View nativeID="phone-offline">
          <Txt kind="small" tone="ink2">
            Getting a phone needs the connection.
          </Txt>
        </View>
      ) : null}
      {phone.error ? <ProblemLine text={sentenceOf(phone.error)} /> : null}
      {stale === null ? null : <ProblemLine text={`What was sent since could not be read. ${stale}`} />}
      {entries.length === 0 ? (
        <Empty sentence="Nothing was sent yet.">
          <Txt tone="ink2">
            Every alarm comes here as a letter, unless its person wants it otherwise. Call a channel out of order on the
            page of a charge that runs, and one is sent.
          </Txt>
        </Empty>
      ) : (
        <>
          <SegmentSwitch
            label="Show what was sent by"
            value={way}
            fit="words"
            segments={shown.map((one) => ({ ...one, count: of(one.value).length }))}
            onChange={setWay}
          />
          {seen.length === 0 ? (
            <Txt tone="ink2">
              {way === 'phone-push' && !hasPhone
                ? 'None yet. You have no phone of the demo.'
                : way === 'browser-push'
                  ? 'None yet. A browser gets them once pushes are switched on in it, under where your alerts go.'
                  : 'None yet.'}
            </Txt>
          ) : (
            <View role="list" aria-label="What was sent">
              {seen.map((entry) => (
                <MailboxEntry key={entry.number} entry={entry} now={now} />
              ))}
            </View>
          )}
        </>
      )}
    </View>
  );
}
