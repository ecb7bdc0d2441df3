import { inject, provide, type ComputedRef, type InjectionKey } from 'vue';

/** What the groups of fields of one criteria form share: the values they edit, what is wrong with them, and where their words stand. */
export interface CriteriaForm<Values extends object> {
  values: Values;
  errors: ComputedRef<Partial<Record<string, string>>>;
  leave: (field: never) => void;
  /** Key of the texts, such as `parts.criterion`; a field's label stands there under its own name. */
  texts: string;
}

const key: InjectionKey<CriteriaForm<object>> = Symbol('criteria form');

export function provideCriteriaForm<Values extends object>(form: CriteriaForm<Values>): void {
  provide(key, form as CriteriaForm<object>);
}

export function useCriteriaForm<Values extends object>() {
  const form = inject(key);
  if (!form) throw new Error('Fields of criteria stand inside a form that provides them.');
  return {
    ...(form as CriteriaForm<Values>),
    leave: form.leave as unknown as (field: string) => void,
  };
}
