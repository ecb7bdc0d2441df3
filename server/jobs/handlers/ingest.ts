import { database } from '../../database/connection';
import { lapsedUploads } from '../../ingest/lease';
import { loadUpload } from '../../services/uploads/load-upload';

/** Queue `ingest`: reads an uploaded file into readings, then analyses its lot. */
export async function handleIngest(data: { uploadId: string }): Promise<void> {
  await loadUpload(data.uploadId);
}

/**
 * Loads what no job stands for any more: uploads whose worker died in the middle, and jobs that were lost. The claim
 * keeps two workers from the same upload, so looking too often does no harm.
 */
export async function takeUpLapsed(): Promise<void> {
  for (const uploadId of await lapsedUploads(database().pool)) await loadUpload(uploadId);
}
