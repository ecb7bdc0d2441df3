import { onScopeDispose, ref, shallowRef } from 'vue';
import * as contract from '@shared/contract/uploads';
import { type Upload } from '@shared/contract/uploads';
import { pathOf } from '@/api/call';
import { readUpload } from '@/api/uploads';

const pollEveryMs = 2000;

/** Follows one upload until it has ended: by server-sent events, and by asking where the stream cannot be had. */
export function useUploadProgress(id: string, onEnded: (upload: Upload) => void) {
  const upload = shallowRef<Upload | null>(null);
  const lost = ref(false);
  let timer: ReturnType<typeof setInterval> | undefined;
  const source = new EventSource(pathOf(contract.streamUpload, { id }));

  function stop(): void {
    source.close();
    clearInterval(timer);
  }

  function take(next: Upload): void {
    lost.value = false;
    upload.value = next;
    if (next.state === 'queued' || next.state === 'running') return;
    stop();
    onEnded(next);
  }

  source.addEventListener('upload', (event: MessageEvent<string>) =>
    take(JSON.parse(event.data) as Upload),
  );
  source.onerror = () => {
    timer ??= setInterval(() => {
      readUpload(id).then(take, () => (lost.value = true));
    }, pollEveryMs);
  };
  onScopeDispose(stop);
  return { upload, lost };
}
