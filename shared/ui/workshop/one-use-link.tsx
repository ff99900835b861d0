import { useState } from 'react';
import { View } from 'react-native';
import type { OneUseLinkDto } from '@/shared/contract/people';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Txt } from '../primitives/txt';

/** Puts a text on the clipboard; false where the browser has none (plain http). */
async function copy(text: string): Promise<boolean> {
  try {
    await navigator.clipboard.writeText(text);
    return true;
  } catch {
    return false;
  }
}

/** A one-use link, shown this once. Only its hash is kept on the server. */
export function OneUseLink({ link, forWhom, now }: { link: OneUseLinkDto; forWhom: string; now: number }) {
  const { zone, marks } = useFormats();
  const [copied, setCopied] = useState<'yes' | 'no' | null>(null);
  return (
    <CallOut tone="amber" label={`Link for ${forWhom}`}>
      <View style={{ rowGap: 8 }}>
        <Txt bold>{`Give this link to ${forWhom}. It is shown only now.`}</Txt>
        <Txt selectable style={{ wordBreak: 'break-all' } as object}>
          {link.url}
        </Txt>
        <Button
          look="line"
          size="small"
          title="Copy the link"
          onPress={() => void copy(link.url).then((done) => setCopied(done ? 'yes' : 'no'))}
        />
        <Txt kind="small" role="status">
          {copied === 'yes'
            ? 'Copied.'
            : copied === 'no'
              ? 'This browser does not copy here. Mark the link and copy it by hand.'
              : `Works once, until ${moment(Date.parse(link.expiresAt), zone, now, marks)}.`}
        </Txt>
      </View>
    </CallOut>
  );
}
