import { toValue, type MaybeRefOrGetter } from 'vue';
import { onBeforeRouteLeave } from 'vue-router';
import { useEventListener } from '@vueuse/core';
import { useI18n } from 'vue-i18n';

/** Asks before a page with unsaved changes is left, by link or by closing the window. */
export function useUnsavedGuard(isDirty: MaybeRefOrGetter<boolean>): void {
  const { t } = useI18n();
  onBeforeRouteLeave(() => !toValue(isDirty) || window.confirm(t('form.unsaved')));
  useEventListener(window, 'beforeunload', (event) => {
    if (toValue(isDirty)) event.preventDefault();
  });
}
