import { database } from '../../database/connection';
import { type EventStream } from '../../http/event-stream';
import { uploadsChannel } from '../../ingest/lease';
import { type Listener, listen } from '../../jobs/listen';
import { presentUpload } from '../../presenters/uploads';
import { findUpload } from './find-upload';

/** A notification can be lost with its connection, so each stream also looks by itself. */
const lookEveryMs = 2000;

const watchers = new Map<string, Set<() => void>>();
let listener: Listener | null = null;

/** One LISTEN connection for this process, for as long as somebody watches. */
function watch(uploadId: string, changed: () => void): () => void {
  const set = watchers.get(uploadId) ?? new Set();
  set.add(changed);
  watchers.set(uploadId, set);
  listener ??= listen(database().pool, uploadsChannel, (id) =>
    watchers.get(id)?.forEach((tell) => tell()),
  );
  return () => {
    set.delete(changed);
    if (set.size === 0) watchers.delete(uploadId);
    if (watchers.size === 0) {
      void listener?.stop();
      listener = null;
    }
  };
}

/** Sends the upload as it stands now, and again whenever it changed, until it has ended. */
export async function streamProgress(
  uploadId: string,
  stream: EventStream,
  onClose: (done: () => void) => void,
) {
  let last = '';
  let reading = false;
  let again = false;
  const tell = async () => {
    if (reading) {
      again = true;
      return;
    }
    reading = true;
    try {
      do {
        again = false;
        const upload = presentUpload(await findUpload(uploadId));
        const text = JSON.stringify(upload);
        if (text !== last) stream.send('upload', upload);
        last = text;
        if (!['queued', 'running'].includes(upload.state)) {
          stop();
          stream.end();
          return;
        }
      } while (again && !stream.closed);
    } catch {
      // The database is away: the next look tells.
    } finally {
      reading = false;
    }
  };
  const unwatch = watch(uploadId, () => void tell());
  const timer = setInterval(() => void tell(), lookEveryMs);
  const stop = () => {
    clearInterval(timer);
    unwatch();
  };
  onClose(stop);
  await tell();
}
