import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useContractForm, useFormField } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { missingHere } from '@/shared/client/secure-context';
import { useMember } from '@/shared/client/session';
import { useApproveWall, useRefuseWall, useWallRequest } from '@/shared/client/walls';
import { readQuantity } from '@/shared/contract/read-quantity';
import { approveWallSchema, userCode } from '@/shared/contract/wall';
import { FormStack, FieldPair } from '@/shared/ui/auth/form-stack';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { duration } from '@/shared/ui/format/duration';
import { NBSP } from '@/shared/ui/format/marks';
import { Button } from '@/shared/ui/primitives/button';
import { Field } from '@/shared/ui/primitives/field';
import { useToast } from '@/shared/ui/primitives/toast';
import { Span, Txt } from '@/shared/ui/primitives/txt';
import { ButtonRow, Foot } from '@/shared/ui/screen/foot';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { ReachPicture } from '@/shared/ui/wall/reach-picture';
import { reachOf } from '@/shared/ui/wall/wall-reach';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const usualInches = 55;

/** Lets a screen show the board: opened by the code in its picture, or typed. */
export default function Approve() {
  const router = useRouter();
  const gate = useGate('wall:approve');
  const back = () => (router.canGoBack() ? router.back() : router.replace('/workshop' as Href));
  if (!gate.may) {
    return (
      <Screen single header={<HeaderBar title="Approve a wall" onBack={back} />}>
        <Forbidden
          what="Walls are let in"
          roles={gate.roles}
          people={gate.people}
          action={{ title: 'Go to the bench', onPress: () => router.replace('/bench' as Href) }}
        />
      </Screen>
    );
  }
  return <ApproveForm onBack={back} />;
}

/** '40 s', '3 min' */
const agoWords = (s: number): string => (s < 120 ? `${Math.max(0, Math.round(s))}${NBSP}s` : duration(s, 'minute'));

const numberIn = (text: string, unit: 'in' | 'm', max: number): number | null => {
  const reading = readQuantity(text, { name: '', unit, min: 0, aboveMin: true, max });
  return reading.ok ? reading.value : null;
};

function ApproveForm({ onBack }: { onBack: () => void }) {
  const { person } = useMember();
  const { code: opened = '' } = useLocalSearchParams<{ code?: string }>();
  const router = useRouter();
  const toast = useToast();
  const approve = useApproveWall();
  const refuse = useRefuseWall();
  const done = (text: string) => {
    toast({ text });
    router.replace('/workshop' as Href);
  };
  const f = useContractForm({
    schema: approveWallSchema,
    initial: { userCode: opened, name: '', diagonalInches: '', distanceMetres: '' },
    draft: 'approve',
    // The code in the address counts, not one that was typed for another screen.
    secret: ['userCode'],
    send: async (output) => {
      await approve.mutateAsync(output);
      done(`${output.name} shows the board now.`);
    },
  });
  const [code, name, diagonal, distance] = [
    useFormField(f, 'userCode'),
    useFormField(f, 'name'),
    useFormField(f, 'diagonalInches'),
    useFormField(f, 'distanceMetres'),
  ];
  const typed = userCode.safeParse(code.value);
  const request = useWallRequest(typed.success ? typed.data : null);
  const now = useNow(1000);
  const found = request.data;
  const none = isProblem(request.error) && request.error.status === 404;
  const inches = numberIn(diagonal.value, 'in', 150);
  const metres = numberIn(distance.value, 'm', 50);
  return (
    <Screen
      single
      header={
        <HeaderBar
          title="Approve a wall"
          sub={`Workshop · ${person.name.split(' ')[0]}, ${person.role}`}
          onBack={onBack}
        />
      }
      foot={
        <Foot note={found ? undefined : 'The code of a screen comes first.'} noteId="approve-why">
          <ButtonRow>
            <Button
              title="Refuse"
              look="line"
              disabled={!found}
              describedBy={found ? undefined : 'approve-why'}
              busy={refuse.isPending}
              onPress={() => {
                if (typed.success) refuse.mutate(typed.data, { onSuccess: () => done('The screen was refused.') });
              }}
              style={{ width: 128 }}
            />
            <Button
              title="Approve the wall"
              grow
              disabled={!found}
              describedBy={found ? undefined : 'approve-why'}
              busy={f.busy}
              onPress={() => void f.submit()}
            />
          </ButtonRow>
        </Foot>
      }
    >
      <FormStack>
        <Field
          label="Code on the screen"
          kind="label"
          size="large"
          autoFocus={opened === ''}
          {...code}
          error={code.error ?? (none ? 'No screen shows this code now.' : undefined)}
          verdict={
            found
              ? { inside: true, text: `found, ${agoWords((now - Date.parse(found.askedAt)) / 1000)} ago` }
              : undefined
          }
        />
        <CameraNote />
        {request.isError && !none ? <ProblemLine text={sentenceOf(request.error)} /> : null}
        {found ? (
          <Txt tone="ink2">
            <Span bold tone="ink">
              A screen asks to show your board.
            </Span>
            {` ${found.device}. It may read the board and nothing else, until you take that back.`}
          </Txt>
        ) : null}
        <Field label="Name" hint="Where it hangs: Wall by the lift." {...name} />
        <FieldPair>
          <Field label="Diagonal" kind="decimal" unit="in" {...diagonal} />
          <Field label="Farthest reader" kind="decimal" unit="m" {...distance} />
        </FieldPair>
        <Txt kind="label">
          {metres === null
            ? `How far it is read${inches === null ? `, on ${usualInches}${NBSP}in` : ''}`
            : `What is read from ${metres}${NBSP}m`}
        </Txt>
        <ReachPicture reach={reachOf(inches ?? usualInches)} distance={metres} />
        <ProblemLine text={f.problem ?? (refuse.error ? sentenceOf(refuse.error) : null)} />
      </FormStack>
    </Screen>
  );
}

/** Why this page scans no code, where a browser refuses it the camera. */
function CameraNote() {
  const [missing] = missingHere(['camera']);
  return missing ? (
    <Txt kind="small" tone="ink2">
      {missing.sentence}
    </Txt>
  ) : null;
}
