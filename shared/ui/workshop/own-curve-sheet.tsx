import { useState } from 'react';
import { View } from 'react-native';
import { EN_DASH, NBSP } from '../format/marks';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Field } from '../primitives/field';
import { Table } from '../primitives/table';
import { Span, Txt } from '../primitives/txt';
import type { CurveInput } from './curve-layout';
import { CurvePicture } from './curve-picture';
import { fileProblem, readCurveText, understoodWords, type CurveRead } from './curve-text';
import { canPickFile, pickTextFile } from './pick-text-file';

/** A curve as it was pasted or picked; kept while the sheet is closed. */
export interface CurveDraft {
  text: string;
  /** Of the file it came out of; empty: pasted. */
  fileName: string;
}

const noteId = 'own-curve-note';

/** A workshop's own curve: picked or pasted, what was understood of it, its picture, and only then saved. */
export function OwnCurveSheet({
  open,
  input,
  draft,
  onDraft,
  busy,
  problem,
  onSave,
  onClose,
}: {
  open: boolean;
  /** Limits and capacity of the type as they are typed. */
  input: CurveInput;
  draft: CurveDraft;
  onDraft: (draft: CurveDraft) => void;
  busy: boolean;
  /** The server's sentences where it was refused; empty: none. */
  problem: readonly string[];
  onSave: (text: string) => void;
  onClose: () => void;
}) {
  const [unread, setUnread] = useState<string | null>(null);
  const read = readCurveText(draft.text, input.chemistry);
  const good = read?.own.ok === true;
  const pick = () =>
    pickTextFile('.csv,.txt,text/csv,text/plain').then(
      (picked) => {
        if (!picked) return;
        const wrong = fileProblem(picked);
        setUnread(wrong);
        // What stood there stays: a file that is no table takes nothing away.
        if (wrong === null) onDraft({ text: picked.text, fileName: picked.name });
      },
      () => setUnread('The file could not be read. Choose it again, or paste its rows.'),
    );
  return (
    <BottomSheet
      open={open}
      onClose={onClose}
      title="Own curve"
      scrimCloses={false}
      actions={
        <View style={{ rowGap: 6 }}>
          <View nativeID={noteId}>
            {good ? null : (
              <Txt kind="small" tone="ink2">
                {read === null
                  ? 'Nothing to save yet.'
                  : 'It is saved once every row is understood. What stands there is kept.'}
              </Txt>
            )}
            {problem.map((sentence) => (
              <Txt key={sentence} kind="label" tone="alarm" role="alert">
                {sentence}
              </Txt>
            ))}
          </View>
          <Button
            title="Save the curve"
            disabled={!good}
            busy={busy}
            describedBy={noteId}
            onPress={() => onSave(draft.text)}
          />
        </View>
      }
    >
      <View style={{ rowGap: 14 }}>
        <Txt>
          {`State of charge and rest volts of one cell side by side, a row each: 8 points or more, from 10 to 90${NBSP}% of charge.`}
        </Txt>
        {canPickFile ? (
          <Button look="line" icon="upload" title="Choose a CSV file" onPress={() => void pick()} />
        ) : null}
        {unread ? (
          <Txt kind="label" tone="alarm" role="alert">
            {unread}
          </Txt>
        ) : null}
        <Field
          label={canPickFile ? 'Or paste the rows' : 'Paste the rows'}
          hint={draft.fileName || 'comma, semicolon or tab; per cent or shares'}
          multiline
          lines={6}
          value={draft.text}
          onChangeText={(text) => {
            setUnread(null);
            onDraft({ text, fileName: '' });
          }}
        />
        {read ? <Understood read={read} input={input} /> : null}
      </View>
    </BottomSheet>
  );
}

/** What the rows were read as: the sentence, the first lines, and the picture; or by row what to change. */
function Understood({ read, input }: { read: CurveRead; input: CurveInput }) {
  const { own } = read;
  return (
    <>
      {own.ok ? (
        <Txt bold role="status">
          {understoodWords(read)}
        </Txt>
      ) : (
        <CallOut tone="red" label="What to change">
          <View style={{ rowGap: 4 }}>
            {own.problems.map(({ row, text }) => (
              <Txt key={`${row} ${text}`}>
                {row === null ? null : <Span bold>{`Row ${row}: `}</Span>}
                {text}
              </Txt>
            ))}
          </View>
        </CallOut>
      )}
      <Table
        label="First lines and what they were read as"
        keepOnPhone
        rows={read.lines.map((line, at) => ({ ...line, row: at + 1 }))}
        rowKey={(line) => String(line.row)}
        columns={[
          { key: 'row', title: 'Row', width: 36, cell: (line) => String(line.row) },
          { key: 'text', title: 'As it stands', share: 1.6, tone: 'ink2', cell: (line) => line.text },
          { key: 'soc', title: 'Charge', numeric: true, cell: (line) => line.soc ?? EN_DASH },
          { key: 'volts', title: 'Volts', numeric: true, cell: (line) => line.volts ?? EN_DASH },
        ]}
      />
      {own.ok ? <CurvePicture {...input} curve={own.curve} /> : null}
    </>
  );
}
