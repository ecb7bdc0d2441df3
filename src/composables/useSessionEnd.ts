import { computed, ref, watch } from 'vue';
import { useIntervalFn } from '@vueuse/core';
import { lookAtSession } from '@/api/account';
import { useSession } from '@/stores/session';

const longestWarningMs = 120_000;
const leastWarningMs = 30_000;

/** How long before its end a session of this length is warned of: two minutes, less for a short one, never under 30 s. */
export function warningMs(lengthMs: number): number {
  return Math.min(longestWarningMs, Math.max(leastWarningMs, lengthMs / 3));
}

/**
 * Watches the end of the session. The server moves it with every request from the desk, so it is asked once more,
 * without touching it, before anybody is warned; at the end it is asked again, and its refusal opens SignInAgain.
 */
export function useSessionEnd(now: () => number = () => Date.now()) {
  const session = useSession();
  const endsAtMs = ref<number | null>(null);
  const leadMs = ref(longestWarningMs);
  const tickMs = ref(now());
  /** The server has confirmed the end since it came near. */
  const isSure = ref(false);
  const isExtending = ref(false);
  /** Said no to: the same end is not warned of twice. */
  const dismissedEndMs = ref<number | null>(null);
  let nextLookMs = 0;
  let isAsking = false;

  watch(
    () => session.person?.sessionEndsAt,
    (end) => {
      endsAtMs.value = end ? new Date(end).getTime() : null;
      if (endsAtMs.value !== null) leadMs.value = warningMs(endsAtMs.value - now());
      nextLookMs = 0;
    },
    { immediate: true },
  );

  useIntervalFn(() => {
    tickMs.value = now();
    if (endsAtMs.value === null || isAsking || tickMs.value < nextLookMs) return;
    const leftMs = endsAtMs.value - tickMs.value;
    if (leftMs <= 0) void look(5_000);
    else if (leftMs <= leadMs.value) void look(leadMs.value / 4);
  }, 1000);

  async function look(againInMs: number): Promise<void> {
    isAsking = true;
    try {
      const person = await lookAtSession();
      endsAtMs.value = new Date(person.sessionEndsAt).getTime();
    } catch {
      // 401 is told by the client itself; a broken line by the note in the frame. Both leave this clock as it is.
    } finally {
      nextLookMs = now() + againInMs;
      isAsking = false;
      isSure.value = true;
    }
  }

  watch(
    () => endsAtMs.value !== null && endsAtMs.value - tickMs.value > leadMs.value,
    (isFar) => isFar && (isSure.value = false),
  );

  const secondsLeft = computed(() =>
    endsAtMs.value === null ? null : Math.max(0, Math.ceil((endsAtMs.value - tickMs.value) / 1000)),
  );
  const isNear = computed(
    () =>
      isSure.value &&
      secondsLeft.value !== null &&
      secondsLeft.value > 0 &&
      1000 * secondsLeft.value <= leadMs.value &&
      dismissedEndMs.value !== endsAtMs.value,
  );
  /** Extending did not help: the session has reached its greatest length. */
  const isFinal = ref(false);

  async function extend(): Promise<void> {
    isExtending.value = true;
    const nearMs = leadMs.value;
    try {
      await session.extend();
      const endMs = new Date(session.person?.sessionEndsAt ?? 0).getTime();
      isFinal.value = endMs - now() <= nearMs;
    } finally {
      isExtending.value = false;
    }
  }

  function dismiss(): void {
    dismissedEndMs.value = endsAtMs.value;
  }

  return { secondsLeft, isNear, isFinal, isExtending, extend, dismiss };
}
