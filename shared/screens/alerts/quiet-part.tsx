import { useState } from 'react';
import { View } from 'react-native';
import { useChangeAlertSettings } from '@/shared/client/alert-settings';
import { useContractForm, useFormField } from '@/shared/client/forms';
import { sentenceOf } from '@/shared/client/api-problem';
import { useLink } from '@/shared/client/link';
import { changeAlertSettingsSchema, type AlertSettingsDto } from '@/shared/contract/alert-settings';
import { FormStack } from '@/shared/ui/auth/form-stack';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { BoundCheck } from '@/shared/ui/forms/bound';
import { MoreGroup } from '@/shared/ui/more/more-row';
import { Button } from '@/shared/ui/primitives/button';
import { TimeField } from '@/shared/ui/primitives/time-field';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';

/** Hours in which nothing makes a noise. */
export function QuietPart({ settings }: { settings: AlertSettingsDto }) {
  const change = useChangeAlertSettings();
  const toast = useToast();
  const offline = useLink().state === 'down';
  const [initial] = useState(() => ({
    quiet: settings.quiet ?? { from: '', to: '' },
    alarmsBreakThrough: settings.alarmsBreakThrough,
  }));
  const f = useContractForm({
    schema: changeAlertSettingsSchema,
    initial,
    draft: 'me.quiet-hours',
    send: async ({ quiet, alarmsBreakThrough }) => {
      await change.mutateAsync({ quiet, alarmsBreakThrough });
      f.clear({ quiet: quiet ?? { from: '', to: '' }, alarmsBreakThrough: alarmsBreakThrough ?? true });
      toast({ text: 'The quiet hours are saved.' });
    },
  });
  const off = useChangeAlertSettings();
  return (
    <MoreGroup title="Quiet hours">
      <FormStack>
        <Txt kind="small" tone="ink2">
          {settings.quiet
            ? `From ${settings.quiet.from} to ${settings.quiet.to} on the clock of the workshop. What comes in them is sent when they are over, if it is still open.`
            : 'None: every alert comes at once. Times are those of the workshop.'}
        </Txt>
        <TimeField label="From" {...useFormField(f, 'quiet.from')} />
        <TimeField label="To" {...useFormField(f, 'quiet.to')} />
        <BoundCheck
          form={f.form}
          name="alarmsBreakThrough"
          title="Alarms come all the same"
          meaning="A module too warm does not wait for the morning."
        />
        <ProblemLine text={f.problem ?? (off.error ? sentenceOf(off.error) : null)} />
        {offline ? (
          <View nativeID="quiet-offline">
            <Txt kind="small" tone="ink2">
              Saving needs the connection. What you type is kept.
            </Txt>
          </View>
        ) : null}
        <Button
          title="Save the quiet hours"
          look="line"
          busy={f.busy}
          disabled={offline}
          describedBy={offline ? 'quiet-offline' : undefined}
          onPress={() => void f.submit()}
        />
        {settings.quiet ? (
          <Button
            title="No quiet hours"
            look="line"
            busy={off.isPending}
            disabled={offline}
            describedBy={offline ? 'quiet-offline' : undefined}
            onPress={() =>
              off.mutate(
                { quiet: null },
                {
                  onSuccess: (after) =>
                    f.clear({ quiet: { from: '', to: '' }, alarmsBreakThrough: after.alarmsBreakThrough }),
                },
              )
            }
          />
        ) : null}
      </FormStack>
    </MoreGroup>
  );
}
