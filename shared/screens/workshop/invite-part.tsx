import { useState } from 'react';
import { View } from 'react-native';
import { useNow } from '@/shared/client/clock';
import { useContractForm } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { useInvite } from '@/shared/client/people';
import { inviteSchema, type OneUseLinkDto } from '@/shared/contract/people';
import { Rule } from '@/shared/ui/primitives/rule';
import { InviteFields, type InviteTexts } from '@/shared/ui/workshop/invite-fields';
import { OneUseLink } from '@/shared/ui/workshop/one-use-link';

/** Inviting somebody: the form, and the link that is shown once. Nothing for those who may not. */
export function InvitePart({ rule = false }: { rule?: boolean }) {
  const may = useGate('people:write').may;
  const now = useNow(60_000);
  const invite = useInvite();
  const [made, setMade] = useState<{ link: OneUseLinkDto; email: string } | null>(null);
  const empty: InviteTexts = { email: '', role: 'technician' };
  const f = useContractForm({
    schema: inviteSchema,
    initial: empty,
    draft: 'invite',
    send: async (output) => {
      setMade({ link: await invite.mutateAsync(output), email: output.email });
      f.clear(empty);
    },
  });
  if (!may) return null;
  return (
    <View style={{ rowGap: 16 }}>
      {rule ? <Rule gap={8} /> : null}
      {made ? <OneUseLink key={made.link.url} link={made.link} forWhom={made.email} now={now} /> : null}
      <InviteFields form={f.form} busy={f.busy} problem={f.problem} onSend={() => void f.submit()} />
    </View>
  );
}
