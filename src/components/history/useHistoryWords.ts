import { useI18n } from 'vue-i18n';

/** Words for acts and kinds of record; one that has none yet is shown as it is written in the entry. */
export function useHistoryWords() {
  const { t, te } = useI18n();
  const known = (key: string, raw: string) => (te(key) ? t(key) : raw);
  return {
    actWords: (act: string) => known(`history.acts.${act.replaceAll('.', '_')}`, act),
    typeWords: (type: string) => known(`history.types.${type}`, type.replaceAll('_', ' ')),
  };
}
