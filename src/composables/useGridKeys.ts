import { onBeforeUnmount, watch, type Ref } from 'vue';

const pageRows = 10;
const inner = 'a[href], button, input, select, textarea, [tabindex]';

/**
 * One tab stop for a whole table: arrows, Home, End, Page up and Page down move the focus (with Ctrl to the table's
 * ends). In a cell with controls the focus goes to the controls, one after the other; else to the cell itself.
 */
export function useGridKeys(table: Readonly<Ref<HTMLTableElement | null>>): void {
  let current: HTMLElement | null = null;
  const observer = new MutationObserver(() => table.value && tidy(table.value));

  watch(
    table,
    (element, before) => {
      observer.disconnect();
      before?.removeEventListener('keydown', onKey);
      before?.removeEventListener('focusin', onFocus);
      if (!element) return;
      tidy(element);
      observer.observe(element, { childList: true, subtree: true });
      element.addEventListener('keydown', onKey);
      element.addEventListener('focusin', onFocus);
    },
    { flush: 'post' },
  );
  onBeforeUnmount(() => observer.disconnect());

  function tidy(element: HTMLTableElement): void {
    if (!current || !element.contains(current)) current = null;
    for (const row of element.rows) {
      for (const cell of row.cells) {
        for (const stop of stopsOf(cell)) if (stop !== current) stop.tabIndex = -1;
      }
    }
    current ??= firstStop(element);
    if (current) current.tabIndex = 0;
  }

  function onFocus(event: FocusEvent): void {
    const target = event.target as HTMLElement;
    if (target === current || target.closest('td, th') === null) return;
    moveTo(target, false);
  }

  function moveTo(stop: HTMLElement, withFocus = true): void {
    if (current) current.tabIndex = -1;
    current = stop;
    stop.tabIndex = 0;
    if (withFocus) stop.focus();
  }

  function onKey(event: KeyboardEvent): void {
    const target = event.target as HTMLElement;
    const cell = target.closest<HTMLTableCellElement>('td, th');
    const element = table.value;
    if (!cell || !element || event.altKey || event.metaKey || keepsKeys(target)) return;
    const next = destination(element, cell, target, event);
    if (!next) return;
    event.preventDefault();
    moveTo(next);
  }
}

function destination(
  table: HTMLTableElement,
  cell: HTMLTableCellElement,
  target: HTMLElement,
  event: KeyboardEvent,
): HTMLElement | null | undefined {
  const row = cell.parentElement as HTMLTableRowElement;
  const lastRow = table.rows.length - 1;
  const down = (rows: number) => {
    const to = table.rows[Math.min(lastRow, Math.max(0, row.rowIndex + rows))];
    const below = to?.cells[Math.min(cell.cellIndex, to.cells.length - 1)];
    return below ? stopsOf(below)[0] : undefined;
  };
  const inRow = [...row.cells].flatMap(stopsOf);
  const at = inRow.indexOf(target);
  switch (event.key) {
    case 'ArrowRight':
      return inRow[Math.min(inRow.length - 1, at + 1)];
    case 'ArrowLeft':
      return inRow[Math.max(0, at - 1)];
    case 'ArrowDown':
      return down(1);
    case 'ArrowUp':
      return down(-1);
    case 'PageDown':
      return down(pageRows);
    case 'PageUp':
      return down(-pageRows);
    case 'Home':
      return event.ctrlKey ? firstStop(table) : inRow[0];
    case 'End':
      return event.ctrlKey
        ? [...(table.rows[lastRow]?.cells ?? [])].flatMap(stopsOf).at(-1)
        : inRow.at(-1);
    default:
      return undefined;
  }
}

function stopsOf(cell: HTMLTableCellElement): HTMLElement[] {
  const controls = [...cell.querySelectorAll<HTMLElement>(inner)].filter(
    (control) => !control.matches(':disabled'),
  );
  return controls.length > 0 ? controls : [cell];
}

function firstStop(table: HTMLTableElement): HTMLElement | null {
  const row = table.tBodies[0]?.rows[0] ?? table.rows[0];
  const cell = row?.cells[0];
  return cell ? (stopsOf(cell)[0] ?? null) : null;
}

/** Text fields and selects need the arrows for themselves. */
function keepsKeys(target: HTMLElement): boolean {
  return target.matches(
    'textarea, select, input:not([type=checkbox], [type=radio], [type=button])',
  );
}
