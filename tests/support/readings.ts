import { type Agent } from './api';

export const plainHeader = 'serial,temperature_c,frequency_hz,measured_at';

/** The plain form: `count` units of 16 MHz with offsets of a repeating pattern within ±6 ppm. */
export function plainCsv(count: number, first = 1): string {
  const rows: string[] = [plainHeader];
  for (let i = 0; i < count; i += 1) rows.push(plainRow(first + i));
  return `${rows.join('\n')}\n`;
}

export function plainRow(n: number): string {
  const hz = 16_000_000 + ((n * 7919) % 192) - 96;
  const seconds = String(n % 60).padStart(2, '0');
  return `S${String(n).padStart(7, '0')},25.0,${hz}.${String(n % 1000).padStart(3, '0')},2026-11-30T10:${String(Math.floor(n / 60) % 60).padStart(2, '0')}:${seconds}Z`;
}

export interface UploadAnswer {
  id: string;
  state: string;
  rowsInFile: number;
  rowsTaken: number;
  rowsRefused: number;
  unitsCount: number;
  failure: { code: string; message: string } | null;
  warnings: { code: string; text: string; cleared: boolean }[];
  [key: string]: unknown;
}

/** Uploads and answers the id. */
export async function uploadText(
  agent: Agent,
  lotId: string,
  content: string | Buffer,
  fields: Record<string, string> = {},
  fileName = 'readings.csv',
): Promise<string> {
  let request = agent.post(`/api/lots/${lotId}/uploads`);
  for (const [name, value] of Object.entries(fields)) request = request.field(name, value);
  const answer = await request.attach('file', Buffer.from(content), fileName);
  if (answer.status !== 202)
    throw new Error(`Upload answered ${answer.status}: ${JSON.stringify(answer.body)}`);
  return (answer.body as { id: string }).id;
}

/** Waits until an upload has ended, whichever way. */
export async function ended(agent: Agent, uploadId: string): Promise<UploadAnswer> {
  for (let tries = 0; tries < 400; tries += 1) {
    const { body } = await agent.get(`/api/uploads/${uploadId}`).expect(200);
    const upload = body as UploadAnswer;
    if (!['queued', 'running'].includes(upload.state)) return upload;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error('The upload did not end.');
}
