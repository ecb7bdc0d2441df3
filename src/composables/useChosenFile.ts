import { computed, onScopeDispose, ref, shallowRef } from 'vue';
import { type Mapping, type UploadCheck } from '@shared/contract/uploads';
import { checkUpload, sendFile } from '@/api/upload-file';

export type FileStage = 'checking' | 'checked' | 'sending' | 'sent' | 'failed';

/** One file that was chosen: looked at, mapped, sent. Nothing is written before `send`. */
export function useChosenFile(lotId: string, file: File) {
  const stage = ref<FileStage>('checking');
  const check = shallowRef<UploadCheck | null>(null);
  const error = shallowRef<unknown>(null);
  const sentBytes = ref(0);
  const uploadId = ref<string | null>(null);
  let abort = new AbortController();
  let latest = 0;

  const canSend = computed(
    () => stage.value === 'checked' && check.value !== null && check.value.questions.length === 0,
  );

  /** Looks again with a mapping that the person changed; of several looks the latest counts. */
  async function look(mapping?: Mapping): Promise<void> {
    const mine = ++latest;
    stage.value = 'checking';
    error.value = null;
    try {
      const found = await checkUpload(lotId, file, mapping);
      if (mine !== latest) return;
      check.value = found;
      stage.value = 'checked';
    } catch (problem) {
      if (mine !== latest) return;
      error.value = problem;
      stage.value = check.value ? 'checked' : 'failed';
    }
  }

  async function send(options: { benchId?: string; rememberMapping: boolean }): Promise<void> {
    if (!canSend.value || !check.value) return;
    stage.value = 'sending';
    error.value = null;
    sentBytes.value = 0;
    // One that was stopped stays stopped: each sending has its own.
    abort = new AbortController();
    try {
      const fields = {
        ...options,
        mapping: check.value.mapping,
        acceptWarnings: check.value.warnings.length > 0,
      };
      const { id } = await sendFile(
        lotId,
        file,
        fields,
        (bytes) => (sentBytes.value = bytes),
        abort.signal,
      );
      uploadId.value = id;
      stage.value = 'sent';
    } catch (problem) {
      stage.value = 'checked';
      if (!(problem instanceof DOMException)) error.value = problem;
    }
  }

  onScopeDispose(() => abort.abort());
  void look();
  return {
    stage,
    check,
    error,
    sentBytes,
    uploadId,
    canSend,
    look,
    send,
    stop: () => abort.abort(),
  };
}
