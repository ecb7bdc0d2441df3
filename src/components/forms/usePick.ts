import { computed, ref, watch, type Ref } from 'vue';
import { refDebounced } from '@vueuse/core';
import { keepPreviousData, useQuery } from '@tanstack/vue-query';
import { type PickOption, type PickSource } from './pick-sources';

/** What a PickField knows: the text in it, the options that fit the text, and which of them is pointed at. */
export function usePick(source: () => PickSource, id: Ref<string>) {
  const text = ref('');
  const isTyping = ref(false);
  const isOpen = ref(false);
  const pointed = ref(-1);

  const chosen = useQuery({
    queryKey: computed(() => [source().key, 'pick', 'one', id.value]),
    queryFn: ({ signal }) => source().read(id.value, signal),
    enabled: computed(() => id.value !== ''),
    staleTime: 60_000,
  });
  const chosenLabel = computed(() => (id.value === '' ? '' : (chosen.data.value?.label ?? '')));

  const find = refDebounced(
    computed(() => (isTyping.value ? text.value.trim() : '')),
    150,
  );
  const found = useQuery({
    queryKey: computed(() => [source().key, 'pick', 'find', find.value]),
    queryFn: ({ signal }) => source().search(find.value, signal),
    enabled: isOpen,
    placeholderData: keepPreviousData,
    staleTime: 30_000,
  });
  const options = computed(() => found.data.value ?? []);

  watch(
    chosenLabel,
    (label) => {
      if (!isTyping.value) text.value = label;
    },
    { immediate: true },
  );
  watch(options, () => (pointed.value = isTyping.value && options.value.length > 0 ? 0 : -1));

  function type(): void {
    isTyping.value = true;
    isOpen.value = true;
  }

  function step(by: number): void {
    if (!isOpen.value) isOpen.value = true;
    else if (options.value.length > 0)
      pointed.value = (pointed.value + by + options.value.length) % options.value.length;
  }

  function choose(option: PickOption | undefined): void {
    if (!option) return;
    id.value = option.id;
    isTyping.value = false;
    text.value = option.label;
    close();
  }

  function close(): void {
    isOpen.value = false;
    pointed.value = -1;
  }

  /** Leaving with a text that names one option takes it; an emptied field lets go; anything else goes back to what was chosen. */
  function settle(): void {
    const typed = text.value.trim().toLowerCase();
    if (isTyping.value) {
      const match = options.value.find(({ label }) => label.toLowerCase() === typed);
      if (typed === '') id.value = '';
      else if (match) id.value = match.id;
      isTyping.value = false;
      text.value = typed === '' ? '' : (match?.label ?? chosenLabel.value);
    }
    close();
  }

  const isUnanswered = computed(() => found.isFetching.value || find.value !== text.value.trim());
  const isNone = computed(
    () =>
      isOpen.value && options.value.length === 0 && !found.isPending.value && !found.isError.value,
  );

  return {
    text,
    isOpen,
    pointed,
    options,
    isNone,
    isUnanswered,
    failed: found.isError,
    type,
    step,
    choose,
    close,
    settle,
  };
}
