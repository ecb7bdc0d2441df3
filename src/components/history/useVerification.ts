import { onBeforeUnmount, ref } from 'vue';
import { useQueryClient } from '@tanstack/vue-query';
import { verificationEventsAddress, type Verification } from '@/api/history';

export type VerificationState = 'idle' | 'running' | 'done' | 'failed';

/** Runs the check of the chain on the server and follows it by server-sent events. */
export function useVerification(
  open: (address: string) => EventSource = (a) => new EventSource(a),
) {
  const queries = useQueryClient();
  const state = ref<VerificationState>('idle');
  const checked = ref(0);
  const total = ref<number | null>(null);
  const result = ref<Verification | null>(null);
  /** What the server said; empty when it said nothing because the line broke. */
  const failure = ref('');
  let source: EventSource | null = null;

  function close(): void {
    source?.close();
    source = null;
  }
  onBeforeUnmount(close);

  function start(): void {
    close();
    state.value = 'running';
    checked.value = 0;
    total.value = null;
    result.value = null;
    failure.value = '';
    source = open(verificationEventsAddress());
    source.addEventListener('progress', (event) => {
      const progress = read<{ checked: number; total: number }>(event);
      checked.value = progress.checked;
      total.value = progress.total;
    });
    source.addEventListener('result', (event) => {
      close();
      result.value = read<Verification>(event);
      state.value = 'done';
      void queries.invalidateQueries({ queryKey: ['history', 'verification'] });
      void queries.invalidateQueries({ queryKey: ['work'] });
    });
    source.addEventListener('failed', (event) => fail(read<{ message: string }>(event).message));
    // The browser would open the stream again by itself, and with it start the check anew.
    source.addEventListener('error', () => fail(''));
  }

  function fail(message: string): void {
    close();
    failure.value = message;
    state.value = 'failed';
  }

  function stop(): void {
    close();
    state.value = 'idle';
  }

  return { state, checked, total, result, failure, start, stop };
}

function read<Data>(event: Event): Data {
  return JSON.parse((event as MessageEvent<string>).data) as Data;
}
