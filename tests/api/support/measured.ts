import { randomUUID } from 'node:crypto';
import { type CreateSweep, CreateSweepSchema, type SweepRow } from '../../../shared/contracts/sweep.js';
import type { Answer, Client } from './client.js';
import type { TestPerson } from './people.js';

/** A sweep file of a plain resistor with a little inductance; `ohm` makes the content its own. */
export function tableOf(ohm: number, rows = 24): string {
  const lines = Array.from({ length: rows }, (_, i) => {
    const f = 20 * 1000 ** (i / (rows - 1));
    return `${f.toPrecision(8)},${ohm.toPrecision(8)},${(2 * Math.PI * f * 1e-4).toPrecision(8)}`;
  });
  return `frequency_hz,re_ohm,im_ohm\n${lines.join('\n')}\n`;
}

export async function makeProject({ client, teamId }: TestPerson, name = 'Monitors'): Promise<string> {
  const { status, body } = await client.post<{ id: string }>(`/api/teams/${teamId}/projects`, { name });
  if (status !== 201) throw new Error(`The test project was not made: ${JSON.stringify(body)}`);
  return body.id;
}

export interface Sent {
  readonly fileName?: string;
  readonly sweep?: Partial<CreateSweep>;
}

export function formOf(content: string | Uint8Array, { fileName = 'sweep.csv', sweep = {} }: Sent = {}): FormData {
  const form = new FormData();
  const told = CreateSweepSchema.parse({ name: 'A sweep', batchId: randomUUID(), ...sweep });
  form.append('file', new Blob([content as Uint8Array<ArrayBuffer>]), fileName);
  form.append('sweep', JSON.stringify(told));
  return form;
}

export function upload<Body = { sweep: SweepRow }>(
  client: Client,
  projectId: string,
  content: string | Uint8Array,
  sent: Sent = {},
): Promise<Answer<Body>> {
  return client.send<Body>('POST', `/api/projects/${projectId}/sources`, formOf(content, sent));
}

export async function uploaded(client: Client, projectId: string, content: string, sent: Sent = {}): Promise<SweepRow> {
  const { status, body } = await upload(client, projectId, content, sent);
  if (status !== 201) throw new Error(`The upload was refused: ${JSON.stringify(body)}`);
  return body.sweep;
}
