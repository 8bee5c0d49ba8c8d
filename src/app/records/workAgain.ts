import type { RecordDesk } from '../../engine/recordDesk.client.ts';
import type { Observation } from '../../record/observation.ts';
import { openPhoto } from '../session.ts';
import { failure } from '../state.ts';
import { workedOn } from './saveRecord.ts';

/**
 * Opens the record's photo with its set-up, to be worked on again.
 * @throws Error where the photo is not in the record, with what to do
 */
export async function openPhotoOf(desk: RecordDesk, { id, photo, setup }: Observation): Promise<void> {
  const bytes = await desk.original(id);
  if (!bytes || !photo) {
    throw new Error('The original photo is not in this record: open the photo itself from the start.');
  }
  const { fileName, mimeType, sha256 } = photo.metadata;
  const blob = new Blob([bytes as Uint8Array<ArrayBuffer>], { type: mimeType });
  if (!(await openPhoto(blob, fileName, setup ?? undefined))) throw new Error(failure.value ?? 'Stopped.');
  workedOn.value = { id, sha256 };
  location.hash = '#/';
}
