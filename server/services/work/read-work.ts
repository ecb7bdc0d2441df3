import { type z } from 'zod';
import { type MyWork, type WorkSection } from '@shared/contract/work';
import { type LotState } from '@shared/contract/lots';
import { opening, spelledCount } from '@shared/format/counts';
import { type Actor } from '../../http/actor';
import { presentLotRow } from '../../presenters/lot-row';
import { queryLots } from '../lots/lot-query';
import { readHolds } from '../holds/read-holds';
import { readTasks } from './read-tasks';

type Section = z.infer<typeof WorkSection>;

/** Rows shown of each section; the list behind it shows the rest. */
const shown = 25;

interface SectionText {
  key: string;
  title: string;
  hint: string;
  empty: string;
}

async function lotsSection(actor: Actor, states: LotState[], text: SectionText): Promise<Section> {
  const rows = await queryLots({ state: states, sort: 'stateSince' }, 200);
  const lots = rows.map((row) => presentLotRow(row, actor));
  return {
    ...text,
    lots: lots.slice(0, shown),
    holds: [],
    tasks: [],
    more: Math.max(0, lots.length - shown),
  };
}

async function holdsSection(actor: Actor, text: SectionText): Promise<Section> {
  const { items } = await readHolds(actor, { state: 'not_closed', limit: 200 });
  // Overdue first, then the longest open.
  items.sort(
    (a, b) => Number(b.overdue) - Number(a.overdue) || a.openedAt.localeCompare(b.openedAt),
  );
  return {
    ...text,
    lots: [],
    holds: items.slice(0, shown),
    tasks: [],
    more: Math.max(0, items.length - shown),
  };
}

const texts = {
  decide: {
    key: 'decide',
    title: 'To decide',
    hint: 'longest first',
    empty: 'No lot waits for a decision. A lot comes here once its plan is measured.',
  },
  held: { key: 'held', title: 'On hold', hint: 'supplier answers', empty: 'No lot is on hold.' },
  coming: {
    key: 'coming',
    title: 'Coming',
    hint: 'under inspection',
    empty: 'Nothing is being inspected. A lot comes here when it is registered.',
  },
  measure: {
    key: 'measure',
    title: 'To measure',
    hint: 'longest first',
    empty: 'Nothing is owed. Register a lot when goods arrive.',
  },
  notices: {
    key: 'notices',
    title: 'Hold notices',
    hint: 'your lots',
    empty:
      'None of your lots is on hold. A notice comes here, and by mail, the minute a lot is held.',
  },
  tasks: { key: 'tasks', title: 'To look after', hint: '', empty: 'Nothing needs you.' },
} satisfies Record<string, SectionText>;

/** What waits for the person who asks: since when, why, and the next act. */
export async function readWork(actor: Actor): Promise<MyWork> {
  switch (actor.role) {
    case 'quality_engineer':
      return engineerWork(actor);
    case 'technician': {
      const measure = await lotsSection(actor, ['received', 'under_inspection'], texts.measure);
      const judged = await lotsSection(actor, ['awaiting_disposition', 'on_hold'], {
        ...texts.coming,
        key: 'judged',
        title: 'With quality',
        hint: 'nothing to do',
        empty: 'No lot waits for quality.',
      });
      return {
        headline: waiting(measure.lots.length + measure.more, 'lot'),
        subline: measure.lots.length ? 'Upload readings to move a lot on.' : '',
        sections: [measure, judged],
      };
    }
    case 'supplier_contact': {
      const notices = await holdsSection(actor, texts.notices);
      const mine = notices.holds.filter((hold) => hold.next.mine);
      return {
        headline: waiting(mine.length, 'hold notice'),
        subline: overdueLine(notices.holds.filter((h) => h.overdue).length),
        sections: [notices],
      };
    }
    default: {
      const tasks = await readTasks(actor);
      const section: Section = { ...texts.tasks, lots: [], holds: [], tasks, more: 0 };
      const held = await holdsSection(actor, texts.held);
      return { headline: waiting(tasks.length, 'thing'), subline: '', sections: [section, held] };
    }
  }
}

async function engineerWork(actor: Actor): Promise<MyWork> {
  const decide = await lotsSection(actor, ['awaiting_disposition'], texts.decide);
  const held = await lotsSection(actor, ['on_hold'], texts.held);
  const coming = await lotsSection(actor, ['under_inspection', 'received'], texts.coming);
  const tasks = await readTasks(actor);
  const mine = [...decide.lots, ...held.lots].filter((lot) => lot.next.mine).length;
  const signable = decide.lots.filter((lot) => lot.next.mine).length;
  const overdue = held.lots.filter((lot) => lot.next.overdue).length;
  const sections = tasks.length
    ? [decide, held, coming, { ...texts.tasks, lots: [], holds: [], tasks, more: 0 }]
    : [decide, held, coming];
  return {
    headline: waiting(mine, 'lot'),
    subline: [
      signable ? `${opening(spelledCount(signable, 'lot').split(' ')[0]!)} can be signed now.` : '',
      overdueLine(overdue),
    ]
      .filter(Boolean)
      .join(' '),
    sections,
  };
}

function waiting(count: number, one: string): string {
  if (count === 0) return 'Nothing waits for you';
  return `${opening(spelledCount(count, one))} ${count === 1 ? 'waits' : 'wait'} for you`;
}

function overdueLine(count: number): string {
  if (count === 0) return '';
  return `${opening(spelledCount(count, 'answer'))} ${count === 1 ? 'is' : 'are'} overdue.`;
}
