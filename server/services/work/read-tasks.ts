import { QueryTypes } from 'sequelize';
import { type MyWork } from '@shared/contract/work';
import { countOf } from '@shared/format/counts';
import { date } from '@shared/format/dates';
import { type Actor } from '../../http/actor';
import { Person } from '../../models';

type Task = MyWork['sections'][number]['tasks'][number];

function query<Row extends object>(sql: string): Promise<Row[]> {
  return Person.sequelize!.query<Row>(sql, { type: QueryTypes.SELECT });
}

/** Revisions that wait for a quality engineer's signature. */
async function drafts(): Promise<Task[]> {
  const rows = await query<{ kind: string; owner: string; label: string; created_at: Date }>(
    `SELECT 'parts' AS kind, p.id AS owner, p.part_number || ' revision ' || r.revision AS label, r.created_at
       FROM part_revisions r JOIN parts p ON p.id = r.part_id WHERE r.state = 'draft'
     UNION ALL
     SELECT 'receivers', p.id, p.name || ' revision ' || r.revision, r.created_at
       FROM receiver_revisions r JOIN receivers p ON p.id = r.receiver_id WHERE r.state = 'draft'
     ORDER BY created_at LIMIT 50`,
  );
  return rows.map((row) => ({
    text: `${row.label} waits for approval`,
    to: `/${row.kind}/${row.owner}`,
    since: row.created_at.toISOString(),
    overdue: false,
  }));
}

/** Mail that no try could deliver, and calibrations that are due. */
async function upkeep(): Promise<Task[]> {
  const [dead, due] = await Promise.all([
    query<{ count: string }>(`SELECT count(*) FROM mails WHERE state = 'dead'`),
    query<{ id: string; name: string; calibration_due: string; overdue: boolean }>(
      `SELECT id, name, calibration_due::text, calibration_due < current_date AS overdue FROM benches
       WHERE active AND calibration_due < current_date + 30 ORDER BY calibration_due`,
    ),
  ]);
  const mails = Number(dead[0]!.count);
  return [
    ...due.map((bench) => ({
      text: bench.overdue
        ? `${bench.name}: calibration was due on ${date(bench.calibration_due)}`
        : `${bench.name}: calibration due on ${date(bench.calibration_due)}`,
      to: `/benches/${bench.id}`,
      since: null,
      overdue: bench.overdue,
    })),
    ...(mails > 0
      ? [
          {
            text: `${countOf(mails, 'mail')} could not be delivered`,
            to: '/mail?state=dead',
            since: null,
            overdue: true,
          },
        ]
      : []),
  ];
}

async function invitations(): Promise<Task[]> {
  const rows = await query<{ count: string }>(
    `SELECT count(*) FROM people WHERE state = 'invited'`,
  );
  const count = Number(rows[0]!.count);
  return count > 0
    ? [
        {
          text: `${countOf(count, 'invitation')} not used yet`,
          to: '/people',
          since: null,
          overdue: false,
        },
      ]
    : [];
}

async function verification(): Promise<Task[]> {
  const rows = await query<{ ok: boolean; created_at: Date }>(
    `SELECT (result ->> 'ok')::boolean AS ok, created_at FROM history_verifications ORDER BY created_at DESC LIMIT 1`,
  );
  const last = rows[0];
  if (!last)
    return [
      {
        text: 'The history has not been verified yet',
        to: '/history',
        since: null,
        overdue: false,
      },
    ];
  if (last.ok) return [];
  return [
    {
      text: 'The last check of the history found a broken entry',
      to: '/history',
      since: last.created_at.toISOString(),
      overdue: true,
    },
  ];
}

/** What is no lot and no hold, and waits for this role all the same. */
export async function readTasks(actor: Actor): Promise<Task[]> {
  switch (actor.role) {
    case 'quality_engineer':
      return drafts();
    case 'administrator':
      return [...(await upkeep()), ...(await invitations())];
    case 'auditor':
      return verification();
    default:
      return [];
  }
}
