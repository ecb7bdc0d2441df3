// @vitest-environment jsdom
import { mount } from '@vue/test-utils';
import { defineComponent, h, nextTick, ref } from 'vue';
import { expect, test } from 'vitest';
import { useGridKeys } from '@/composables/useGridKeys';

function grid() {
  const Grid = defineComponent({
    setup() {
      const table = ref<HTMLTableElement | null>(null);
      useGridKeys(table);
      const row = (n: number) =>
        h('tr', [
          h('th', h('a', { href: '#', id: `a${n}` }, 'lot')),
          h('td', { id: `b${n}` }, 'x'),
          h('td', { id: `c${n}` }, 'y'),
        ]);
      return () =>
        h('table', { ref: table }, [
          h('thead', h('tr', [h('th', h('button', { id: 'sort' })), h('th'), h('th')])),
          h(
            'tbody',
            Array.from({ length: 15 }, (_, n) => row(n)),
          ),
        ]);
    },
  });
  return mount(Grid, { attachTo: document.body }).element as HTMLTableElement;
}

test('a table is one tab stop, and the arrows reach every cell and control', async () => {
  const table = grid();
  await nextTick();
  const stops = () =>
    [...table.querySelectorAll<HTMLElement>('*')]
      .filter((element) => element.tabIndex === 0)
      .map(({ id }) => id);
  expect(stops()).toEqual(['a0']);
  table.querySelector<HTMLElement>('#a0')!.focus();
  const press = (key: string, ctrlKey = false) => {
    document.activeElement!.dispatchEvent(
      new KeyboardEvent('keydown', { key, ctrlKey, bubbles: true, cancelable: true }),
    );
    return document.activeElement!.id;
  };
  expect(press('ArrowRight')).toBe('b0');
  expect(press('ArrowDown')).toBe('b1');
  expect(press('End')).toBe('c1');
  expect(press('PageDown')).toBe('c11');
  expect(press('Home')).toBe('a11');
  expect(press('End', true)).toBe('c14');
  expect(press('Home', true)).toBe('a0');
  expect(press('ArrowUp')).toBe('sort');
  expect(stops()).toEqual(['sort']);
});
