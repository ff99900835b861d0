import { useState } from 'react';
import { View } from 'react-native';
import { isProblem } from '@/shared/client/api-problem';
import { photoAddress, useNotePhoto, useRemovePhoto } from '@/shared/client/repairs';
import { positionsOf } from '@/shared/contract/pack';
import { photoOf, photoSightNames, photoSights, type PhotoDto, type PhotoSight } from '@/shared/contract/photo';
import type { RepairDto } from '@/shared/contract/repair';
import { moment } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { BottomSheet } from '@/shared/ui/primitives/bottom-sheet';
import { Button } from '@/shared/ui/primitives/button';
import { ChoiceList } from '@/shared/ui/primitives/choice-row';
import { domElement } from '@/shared/ui/primitives/dom-element';
import { Field } from '@/shared/ui/primitives/field';
import { Select } from '@/shared/ui/primitives/select';
import { Txt } from '@/shared/ui/primitives/txt';
import { photoAlt, sightMeanings } from '@/shared/ui/repair/photo-words';
import { problemOfAct } from './act-problem';

/** What a photo shows, as one value of the list: the pack, 'spare.<id>' or 'module.<position>'. */
type Of = 'pack' | `spare.${string}` | `module.${string}`;

const ofPhoto = ({ spare, modulePosition }: PhotoDto): Of =>
  spare ? `spare.${spare.id}` : modulePosition !== null ? `module.${modulePosition}` : 'pack';

/** The spares a photo of this repair may show: the reserved one, those of its charges, and the one it shows already. */
function sparesOf({ spare, charges }: RepairDto, photo: PhotoDto): { id: string; label: string }[] {
  const all = [
    ...(spare ? [spare] : []),
    ...charges.map((charge) => charge.spare),
    ...(photo.spare ? [photo.spare] : []),
  ];
  return all.filter(({ id }, place) => all.findIndex((one) => one.id === id) === place);
}

/** One photo in full, and what is seen on it. */
export function PhotoSheet({
  repair,
  photo,
  now,
  mayWrite,
  onClose,
}: {
  repair: RepairDto;
  photo: PhotoDto;
  now: number;
  mayWrite: boolean;
  onClose: () => void;
}) {
  const { zone, marks } = useFormats();
  const note = useNotePhoto();
  const remove = useRemovePhoto();
  const [of, setOf] = useState<Of>(ofPhoto(photo));
  const [seen, setSeen] = useState<PhotoSight>(photo.seen);
  const [caption, setCaption] = useState(photo.caption ?? '');
  const [gone, setGone] = useState(false);
  const at = moment(Date.parse(photo.at), zone, now, marks);
  const spares = sparesOf(repair, photo);
  const spareId = of.startsWith('spare.') ? of.slice('spare.'.length) : null;
  const modulePosition = of.startsWith('module.') ? of.slice('module.'.length) : null;
  const waiting =
    seen !== 'none' && spareId !== null && repair.charge?.spare.id === spareId
      ? ['planned', 'queued'].includes(repair.charge.stage)
        ? repair.charge
        : null
      : null;
  const changed = of !== ofPhoto(photo) || seen !== photo.seen || caption.trim() !== (photo.caption ?? '');
  const unnamed = seen !== 'none' && of === 'pack';
  const error = note.error ?? remove.error;
  const problem = (isProblem(error) && Object.values(error.fields)[0]) || problemOfAct(error);
  const busy = note.isPending || remove.isPending;
  const save = () =>
    note.mutate(
      {
        ...{ id: photo.id, rev: photo.rev, seen, modulePosition, spareId },
        caption: caption.trim() === '' ? null : caption.trim(),
        charge: waiting ? { id: waiting.id, rev: waiting.rev } : null,
      },
      { onSuccess: onClose },
    );
  return (
    <BottomSheet
      open
      title={photoOf(photo)}
      aside={at}
      scrimCloses={!changed}
      onClose={onClose}
      actions={
        mayWrite ? (
          <View style={{ rowGap: 8 }}>
            {problem ? (
              <Txt tone="alarm" bold role="alert">
                {problem}
              </Txt>
            ) : null}
            {unnamed ? (
              <Txt kind="small" tone="ink2" nativeID="photo-why">
                Say on which module it was seen.
              </Txt>
            ) : null}
            <Button
              title="Save what is seen"
              disabled={!changed || unnamed}
              describedBy={unnamed ? 'photo-why' : undefined}
              busy={busy}
              onPress={save}
            />
          </View>
        ) : undefined
      }
    >
      <View style={{ rowGap: 14 }}>
        {gone ? (
          <Txt tone="alarm" role="alert">
            The picture could not be fetched. Close it and open it again when the connection is back.
          </Txt>
        ) : (
          domElement('img', {
            src: photoAddress(photo.id, 'picture'),
            alt: photoAlt(photo, at),
            width: photo.width,
            height: photo.height,
            onError: () => setGone(true),
            style: { width: '100%', height: 'auto', maxHeight: 560, objectFit: 'contain' },
          })
        )}
        {mayWrite ? (
          <>
            <Select<Of>
              label="It shows"
              value={of}
              options={[
                { value: 'pack', label: 'The pack' },
                ...spares.map(({ id, label }) => ({ value: `spare.${id}` as const, label: `Spare ${label}` })),
                ...[...new Set(positionsOf(repair.pack))].map((position) => ({
                  value: `module.${position}` as const,
                  label: `Module ${position}`,
                })),
              ]}
              onChange={setOf}
            />
            <ChoiceList<PhotoSight>
              label="What is seen"
              value={seen}
              outset={14}
              onChange={setSeen}
              choices={photoSights.map((value) => ({
                value,
                title: photoSightNames[value],
                meaning:
                  value !== 'none' && spareId !== null ? 'The spare goes into quarantine.' : sightMeanings[value],
              }))}
            />
            {waiting ? <Txt bold>The charge that waits for this spare falls away with it.</Txt> : null}
            <Field label="What the photo shows" value={caption} maxLength={200} onChangeText={setCaption} />
            <Button
              look="danger"
              size="small"
              title="Remove the photo"
              disabled={photo.seen !== 'none'}
              describedBy="photo-remove"
              busy={busy}
              onPress={() => remove.mutate({ id: photo.id, rev: photo.rev }, { onSuccess: onClose })}
            />
            <Txt kind="small" tone="ink2" nativeID="photo-remove">
              {photo.seen === 'none'
                ? 'It is removed for good.'
                : 'A condition stands on it. Say first that nothing is wrong, where that is so.'}
            </Txt>
          </>
        ) : photo.caption ? (
          <Txt>{photo.caption}</Txt>
        ) : null}
      </View>
    </BottomSheet>
  );
}
