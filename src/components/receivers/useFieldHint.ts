import { computed } from 'vue';
import { useI18n } from 'vue-i18n';
import { useCriteriaForm } from '@/components/criteria/criteria-form';
import { airInterfaceOf, saidByInterface } from './air-interface-text';
import { type ReceiverCriteriaValues } from './receiver-form';

/** A field's hint; once the form was started from an air interface, what that says of the field and how sure it is, too. */
export function useFieldHint() {
  const { t, te } = useI18n();
  const { values } = useCriteriaForm<ReceiverCriteriaValues>();
  const entry = computed(() => airInterfaceOf(values.airInterfaceId));
  const said = computed(() => (entry.value ? saidByInterface(entry.value) : {}));

  return (field: keyof ReceiverCriteriaValues): string | undefined => {
    const own = `receivers.hint.${field}`;
    const value = said.value[field];
    const published =
      entry.value && value
        ? t('receivers.air.says', {
            value,
            standard: entry.value.source.standard,
            certainty: t(`receivers.air.certain.${entry.value.certainty}`),
          })
        : '';
    return [published, te(own) ? t(own) : ''].filter(Boolean).join(' ') || undefined;
  };
}
