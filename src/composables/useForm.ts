import { computed, nextTick, reactive, ref, toRaw, type Ref } from 'vue';
import { ApiError, messageOf } from '@/api/api-error';

export type FieldErrors<Values> = Partial<Record<keyof Values & string, string>>;

export interface FormOptions<Values extends object> {
  initial: Values;
  /** All that is wrong, by field. `fieldErrorsBy(schema)` makes one from a contract's schema. */
  validate?: (values: Values) => FieldErrors<Values>;
  /** The element whose first field in error gets the focus. */
  root?: Readonly<Ref<HTMLElement | null>>;
}

/**
 * A form: says nothing before one has left a field or tried to send, then answers while one types; server errors
 * stand at their field until it changes; a failed try focuses the first field in error.
 */
export function useForm<Values extends object>({
  initial,
  validate = () => ({}),
  root,
}: FormOptions<Values>) {
  // What a query answered is reactive all through, and a proxy cannot be cloned.
  const values = reactive(structuredClone(plain(initial))) as Values;
  const before = ref(JSON.stringify(initial));
  const left = reactive(new Set<string>());
  const wasTried = ref(false);
  const isSending = ref(false);
  const fromServer = ref<Record<string, { message: string; value: string }>>({});
  const failure = ref<string | null>(null);

  const valueOf = (field: string) => JSON.stringify((values as Record<string, unknown>)[field]);
  const found = computed(() => validate(structuredClone(plain(values))));

  const errors = computed(() => {
    const shown: Record<string, string> = {};
    for (const [field, message] of Object.entries(found.value)) {
      if (message && (wasTried.value || left.has(field))) shown[field] = message as string;
    }
    for (const [field, refused] of Object.entries(fromServer.value)) {
      if (valueOf(field) === refused.value) shown[field] = refused.message;
    }
    return shown as FieldErrors<Values>;
  });
  const isDirty = computed(() => JSON.stringify(values) !== before.value);

  function leave(field: keyof Values & string): void {
    left.add(field);
  }

  /** Sends if nothing is wrong; returns whether it went through. Errors of the server end up at their field or in `failure`. */
  async function submit(send: (values: Values) => Promise<unknown>): Promise<boolean> {
    if (isSending.value) return false;
    wasTried.value = true;
    failure.value = null;
    fromServer.value = {};
    if (Object.keys(errors.value).length > 0) {
      await focusFirstError();
      return false;
    }
    isSending.value = true;
    try {
      await send(structuredClone(plain(values)));
      before.value = JSON.stringify(values);
      wasTried.value = false;
      left.clear();
      return true;
    } catch (error) {
      take(error);
      isSending.value = false;
      await focusFirstError();
      return false;
    } finally {
      isSending.value = false;
    }
  }

  function take(error: unknown): void {
    const fields = error instanceof ApiError ? Object.entries(error.fields) : [];
    fromServer.value = Object.fromEntries(
      fields.map(([field, message]) => [field, { message, value: valueOf(field) }]),
    );
    const isAllShown = fields.length > 0 && fields.every(([field]) => field in values);
    failure.value = isAllShown ? null : messageOf(error);
  }

  async function focusFirstError(): Promise<void> {
    await nextTick();
    root?.value?.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus();
  }

  function reset(to: Values = initial): void {
    Object.assign(values, structuredClone(plain(to)));
    before.value = JSON.stringify(values);
    wasTried.value = false;
    left.clear();
    fromServer.value = {};
    failure.value = null;
  }

  return { values, errors, failure, isDirty, isSending, leave, submit, reset };
}

/** A plain copy. Read through the reactive values, so that whoever computes from it is told when one changes. */
function plain<Value>(value: Value): Value {
  if (Array.isArray(value)) return value.map(plain) as Value;
  const raw = toRaw(value);
  if (raw !== null && typeof raw === 'object' && Object.getPrototypeOf(raw) === Object.prototype) {
    return Object.fromEntries(
      Object.entries(value as object).map(([key, one]) => [key, plain(one)]),
    ) as Value;
  }
  return raw;
}
