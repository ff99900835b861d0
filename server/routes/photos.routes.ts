import type { Response } from 'express';
import { photoNoteSchema } from '@/shared/contract/photo';
import { MOST_PHOTO_BYTES, photoField } from '@/shared/contract/photo-upload';
import { addPhoto, notePhoto, photoBytes, removePhoto } from '../services/photos.service';
import type { Policy, RoutesModule } from './define-route';

const read: Policy = { kind: 'capability', capability: 'repair:read' };
const write: Policy = { kind: 'capability', capability: 'repair:write' };

/** A picture as a picture and nothing else. Asked for again each time, so that who is signed out sees none. */
function sendPicture(response: Response, { bytes, tag }: { bytes: Buffer; tag: string }): void {
  response.set({
    'Cache-Control': 'private, no-cache',
    ETag: tag,
    'Content-Disposition': 'inline; filename="photo.jpg"',
    'Content-Security-Policy': "default-src 'none'; sandbox",
    'X-Content-Type-Options': 'nosniff',
  });
  response.type('image/jpeg').send(bytes);
}

export const photosRoutes: RoutesModule = (route) => {
  route({
    method: 'post',
    path: '/repairs/:id/photos',
    policy: write,
    file: { field: photoField, mostBytes: MOST_PHOTO_BYTES },
    idempotent: true,
    status: 201,
    handle: ({ deps, member, params, file, now }) => addPhoto(deps, member, params.id!, file, now),
  });
  route({
    method: 'get',
    path: '/photos/:id',
    policy: read,
    handle: async ({ deps, member, params, response }) =>
      sendPicture(response, await photoBytes(deps, member, params.id!, 'picture')),
  });
  route({
    method: 'get',
    path: '/photos/:id/thumbnail',
    policy: read,
    handle: async ({ deps, member, params, response }) =>
      sendPicture(response, await photoBytes(deps, member, params.id!, 'thumbnail')),
  });
  route({
    method: 'patch',
    path: '/photos/:id',
    policy: write,
    body: photoNoteSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) => notePhoto(deps, member, params.id!, rev, body, now),
  });
  route({
    method: 'delete',
    path: '/photos/:id',
    policy: write,
    ifMatch: true,
    handle: ({ deps, member, params, rev, now }) => removePhoto(deps, member, params.id!, rev, now),
  });
};
