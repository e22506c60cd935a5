import { type EntityManager, In, IsNull } from 'typeorm';
import { NoteFileEntity } from '#server/entities/note-entity.ts';
import { AppError, invalidInput, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { originalKey } from '#server/storage/storage-keys.ts';
import { MAX_NOTE_FILE_BYTES } from '#shared/contract/limits.ts';
import type { NoteFileDto } from '#shared/contract/notes.ts';
import type { ArrivedFile } from './drawing-service.ts';
import { lockNet } from './net-locks.ts';
import { placeOfNet, refusePutAway } from './net-place.ts';
import { presentFile } from './note-queries.ts';
import type { ServiceDeps } from './service-deps.ts';

type FileDeps = Pick<ServiceDeps, 'manager' | 'storage' | 'clock'>;

/** Keeps a file for a text that is still being written. A repeat under the same id is answered, not kept twice. */
export async function takeNoteFile(
  { manager, storage, clock }: FileDeps,
  netId: string,
  id: string,
  file: ArrivedFile,
  actor: Actor,
): Promise<NoteFileDto> {
  if (file.byteSize > MAX_NOTE_FILE_BYTES) throw tooLarge();
  await lockNet(manager, netId);
  refusePutAway(await placeOfNet(manager, netId));
  const held = await manager.findOneBy(NoteFileEntity, { id });
  if (held?.netId === netId && held.uploadedBy === actor.id && held.sha256 === file.sha256)
    return presentFile(held);
  if (held) throw invalidInput([{ path: 'id', message: 'another file has this id' }]);
  await storage.putFile(originalKey(file.sha256), file.path);
  const { fileName, mediaType, sha256, byteSize } = file;
  await manager.insert(NoteFileEntity, {
    id,
    netId,
    entryId: null,
    fileName,
    mediaType,
    byteSize: String(byteSize),
    sha256,
    uploadedBy: actor.id,
    uploadedAt: clock.now(),
  });
  return { id, fileName, mediaType, byteSize };
}

/**
 * Gives an entry the files its author uploaded for it.
 * @throws AppError invalid-input when one is not there, is somebody else's or belongs to another entry
 */
export async function attachFiles(
  manager: EntityManager,
  entry: { id: string; netId: string },
  fileIds: readonly string[],
  actor: Actor,
): Promise<void> {
  const ids = [...new Set(fileIds)];
  if (ids.length === 0) return;
  const waiting = { id: In(ids), netId: entry.netId, uploadedBy: actor.id, entryId: IsNull() };
  const { affected } = await manager.update(NoteFileEntity, waiting, { entryId: entry.id });
  if (affected !== ids.length)
    throw invalidInput([{ path: 'fileIds', message: 'a file is not there any more; attach it again' }]);
}

/** A file of a note on this net; one not yet attached only for who uploaded it. @throws AppError not-found */
export async function noteFileOf(manager: EntityManager, netId: string, fileId: string, personId: string) {
  const file = await manager.findOneBy(NoteFileEntity, { id: fileId, netId });
  if (!file || (file.entryId === null && file.uploadedBy !== personId)) throw notFound();
  return { fileName: file.fileName, mediaType: file.mediaType, key: originalKey(file.sha256) };
}

const tooLarge = () =>
  new AppError(
    'too-large',
    413,
    'The file is too large',
    `A file of a note may have up to ${MAX_NOTE_FILE_BYTES / 1024 / 1024} MB. Upload a whole drawing as a drawing of the dam.`,
  );
