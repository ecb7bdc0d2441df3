import { computed, ref, toValue, watch, type MaybeRefOrGetter, type Ref } from 'vue';
import { useI18n } from 'vue-i18n';
import { useRouter } from 'vue-router';
import { type Analysis } from '@shared/contract/analysis';
import { type Decision } from '@shared/contract/dispositions';
import { type Lot } from '@shared/contract/lots';
import { ApiError } from '@/api/api-error';
import { useAnnouncer } from '@/composables/useAnnouncer';
import { useForm } from '@/composables/useForm';
import { useSignedActs } from '@/composables/queries/useDispositions';
import { useRefreshLot } from '@/composables/queries/useLot';
import {
  decisionBody,
  decisionErrors,
  emptyDecision,
  sortingBody,
  withFormFields,
  type Choice,
  type DecisionValues,
} from './decision-form';

/** The order in which a person weighs them, the mildest first. */
const order: Decision[] = ['accept', 'hold', 'accept_under_concession', 'inspect_all', 'reject'];

/** What may be chosen now; sorting joins once every unit of the lot was measured. */
export function choicesOf(lot: Lot, analysis: Analysis): Choice[] {
  const may = order.filter((decision) => lot.may.decide.includes(decision));
  const everyUnitMeasured =
    analysis.sampling.rule.kind === 'everyUnit' && analysis.units >= lot.lotSize;
  if (!everyUnitMeasured) return may;
  // What was ordered has been done; conforming units can go on by themselves.
  const others = may.filter((decision) => decision !== 'inspect_all');
  const canSort =
    lot.may.decide.includes('reject') &&
    analysis.guardBand.nonconforming + analysis.guardBand.notProven > 0 &&
    analysis.guardBand.conforming > 0;
  return canSort ? [...others, 'sort'] : others;
}

/** The form of a decision: its values, its choices, and the act of signing. */
export function useDecision(
  lot: MaybeRefOrGetter<Lot>,
  analysis: MaybeRefOrGetter<Analysis>,
  root: Readonly<Ref<HTMLElement | null>>,
) {
  const { t } = useI18n();
  const router = useRouter();
  const { announce } = useAnnouncer();
  const acts = useSignedActs(() => toValue(lot).id);
  const refresh = useRefreshLot(() => toValue(lot).id);
  const status = ref<number | null>(null);

  const form = useForm<DecisionValues>({
    initial: emptyDecision(),
    root,
    validate: (values) =>
      decisionErrors(
        values,
        { analysisId: toValue(analysis).id, isOnHold: toValue(lot).state === 'on_hold' },
        {
          choose: t('lots.lot.signing.chooseFirst'),
          correction: t('lots.lot.signing.correctionNeeded'),
          subLotNumber: t('lots.lot.signing.subLotNeeded'),
          treatment: t('lots.lot.signing.treatmentNeeded'),
          days: t('lots.lot.signing.daysNeeded'),
        },
      ),
  });

  const choices = computed(() => choicesOf(toValue(lot), toValue(analysis)));
  watch(choices, (now) => {
    const { decision } = form.values;
    if (decision !== null && !now.includes(decision)) form.values.decision = null;
  });

  async function sign(): Promise<void> {
    status.value = null;
    const { id } = toValue(analysis);
    const went = await form.submit(async (values) => {
      try {
        if (values.decision === 'sort') {
          const { subLotId } = await acts.sort.mutateAsync(sortingBody(values, id));
          form.reset(emptyDecision());
          void announce(t('lots.lot.signing.sorted'));
          await router.push(`/lots/${subLotId}`);
          return;
        }
        await acts.sign.mutateAsync(decisionBody(values, id));
        void announce(
          t('lots.lot.signing.signed', {
            decision: t(`lots.lot.decisions.word.${values.decision}`),
          }),
        );
      } catch (error) {
        status.value = error instanceof ApiError ? error.status : null;
        throw withFormFields(error);
      }
    });
    if (went) form.reset(emptyDecision());
  }

  async function reload(): Promise<void> {
    await refresh();
    status.value = null;
    form.failure.value = null;
    void announce(t('lots.lot.signing.reloaded'));
  }

  return { form, choices, status, sign, reload };
}
