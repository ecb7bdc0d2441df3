// @vitest-environment jsdom
import { reactive } from 'vue';
import { expect, test, vi } from 'vitest';
import { ApiError } from '@/api/api-error';
import { useForm } from '@/composables/useForm';
import { csvText } from '@/components/charts/export-chart';
import { sortedRows } from '@/components/tables/sorted-rows';

const lotForm = () =>
  useForm({
    initial: { lotNumber: '', lotSize: 0 },
    validate: ({ lotNumber, lotSize }) => ({
      ...(lotNumber === '' ? { lotNumber: 'This is needed.' } : {}),
      ...(lotSize < 1 ? { lotSize: 'At least 1.' } : {}),
    }),
  });

test('a form says nothing until a field is left or it is sent', async () => {
  const form = lotForm();
  expect(form.errors.value).toEqual({});
  form.leave('lotNumber');
  expect(form.errors.value).toEqual({ lotNumber: 'This is needed.' });
  const send = vi.fn();
  expect(await form.submit(send)).toBe(false);
  expect(send).not.toHaveBeenCalled();
  expect(form.errors.value).toEqual({ lotNumber: 'This is needed.', lotSize: 'At least 1.' });
});

test('a field that is mended is not wrong any more, and one that is spoilt is', async () => {
  const form = lotForm();
  await form.submit(vi.fn());
  expect(form.errors.value).toHaveProperty('lotSize');
  form.values.lotSize = 5;
  expect(form.errors.value).toEqual({ lotNumber: 'This is needed.' });
  form.values.lotNumber = 'L-1';
  expect(form.errors.value).toEqual({});
  form.values.lotSize = 0;
  expect(form.errors.value).toEqual({ lotSize: 'At least 1.' });
});

test('an error of the server stands at its field until that field changes', async () => {
  const form = lotForm();
  Object.assign(form.values, { lotNumber: 'L-1', lotSize: 5 });
  const taken = new ApiError(409, 'taken', 'This number is taken.', {
    lotNumber: 'This number is taken.',
  });
  expect(await form.submit(() => Promise.reject(taken))).toBe(false);
  expect(form.errors.value).toEqual({ lotNumber: 'This number is taken.' });
  expect(form.failure.value).toBeNull();
  form.values.lotNumber = 'L-2';
  expect(form.errors.value).toEqual({});
});

test('a form is unsaved from the first change until it was sent', async () => {
  const form = lotForm();
  expect(form.isDirty.value).toBe(false);
  Object.assign(form.values, { lotNumber: 'L-1', lotSize: 5 });
  expect(form.isDirty.value).toBe(true);
  expect(await form.submit(() => Promise.resolve())).toBe(true);
  expect(form.isDirty.value).toBe(false);
});

test('numbers leave as CSV untouched, text that a spreadsheet would run does not', () => {
  expect(
    csvText(
      ['unit', 'offset'],
      [
        ['=1+1\nx', '-1.50'],
        [' @sum', -3],
      ],
    ),
  ).toBe('unit,offset\r\n"\'=1+1\nx",-1.50\r\n\' @sum,-3\r\n');
});

test('rows sort by their value, what has none comes last in both directions', () => {
  const rows = [{ n: 2 }, { n: null }, { n: 10 }];
  const columns = [{ key: 'n', heading: 'n', value: (row: { n: number | null }) => row.n }];
  const order = (direction: 'ascending' | 'descending') =>
    sortedRows(rows, columns, { key: 'n', direction }).map(({ n }) => n);
  expect(order('ascending')).toEqual([2, 10, null]);
  expect(order('descending')).toEqual([10, 2, null]);
});

test('a form starts from what a query answered, reactive all through', () => {
  const answer = reactive({ name: 'B', temperatures: [-40, 85], rule: { level: 'II' } });
  const form = useForm({ initial: { ...answer } });
  form.values.temperatures.push(25);
  expect(form.values).toEqual({ name: 'B', temperatures: [-40, 85, 25], rule: { level: 'II' } });
  expect(answer.temperatures).toEqual([-40, 85]);
});
