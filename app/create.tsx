import { useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { useNow } from '@/shared/client/clock';
import { useContractForm, useFormField, wrongSentence } from '@/shared/client/forms';
import { useCreateWorkshop } from '@/shared/client/session';
import { createWorkshopSchema } from '@/shared/contract/session';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { PasswordField } from '@/shared/ui/auth/password-field';
import { knownZones } from '@/shared/ui/auth/zones';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { CheckBox } from '@/shared/ui/primitives/check-box';
import { Field } from '@/shared/ui/primitives/field';
import { Rule } from '@/shared/ui/primitives/rule';
import { Select } from '@/shared/ui/primitives/select';
import { Span, Txt } from '@/shared/ui/primitives/txt';
import { Foot } from '@/shared/ui/screen/foot';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { FormStack } from '@/shared/ui/auth/form-stack';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const deviceZone = Intl.DateTimeFormat().resolvedOptions().timeZone;
const zones = knownZones(deviceZone).map((zone) => ({ value: zone, label: zone.replaceAll('_', ' ') }));

export default function Create() {
  const router = useRouter();
  const { marks } = useFormats();
  const now = useNow(60_000);
  const create = useCreateWorkshop();
  const [agreed, setAgreed] = useState(false);
  const [asked, setAsked] = useState(false);
  const f = useContractForm({
    schema: createWorkshopSchema,
    initial: { workshopName: '', zone: deviceZone, name: '', email: '', password: '' },
    draft: 'create',
    secret: ['password'],
    send: (output) => create.mutateAsync(output),
  });
  const [workshopName, zone, name, email, password] = [
    useFormField(f, 'workshopName'),
    useFormField(f, 'zone'),
    useFormField(f, 'name'),
    useFormField(f, 'email'),
    useFormField(f, 'password'),
  ];
  const back = () => (router.canGoBack() ? router.back() : router.replace('/sign-in' as Href));
  return (
    <Screen
      single
      header={<HeaderBar title="Create a workshop" sub="You become its first manager" onBack={back} />}
      foot={
        <Foot note={f.wrong > 0 ? wrongSentence(f.wrong) : undefined}>
          <Button
            title="Create the workshop"
            busy={f.busy}
            onPress={() => {
              setAsked(true);
              // Not sent before it is ticked, but every field is looked at.
              void (agreed ? f.submit() : f.check());
            }}
          />
        </Foot>
      }
    >
      <FormStack>
        <Field label="Workshop" required nextKey="next" autoComplete="organization" {...workshopName} />
        <Select
          label="Its clock"
          beside={
            zone.value === deviceZone ? (
              <Txt kind="small" tone="ink2">
                from this device
              </Txt>
            ) : null
          }
          hint={`Now ${clock(now, zone.value || 'UTC', marks)} there.`}
          options={zones}
          {...zone}
        />
        <Field label="Your name" required nextKey="next" autoComplete="name" {...name} />
        <Field label="E-mail" kind="email" autoComplete="username" required nextKey="next" {...email} />
        <PasswordField label="Password" fresh hint="12 characters at least; 15 or more is better." {...password} />
        <CheckBox
          checked={agreed}
          onChange={setAgreed}
          title="We have trained people, a risk assessment and the makers’ limits at hand. Bidewell is an aid to them and never switches a charger."
          error={asked && !agreed ? 'Tick this to go on.' : undefined}
        />
        <ProblemLine text={f.problem} />
        <Rule gap={0} />
        <Txt kind="small" tone="ink2">
          <Span bold tone="ink">
            Next:
          </Span>{' '}
          chargers and channels, module types, people by invitation. No other workshop sees anything of yours.
        </Txt>
      </FormStack>
    </Screen>
  );
}
