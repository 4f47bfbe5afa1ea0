import { issueWords } from '../kit/issue-words.js';
import { answer, type Job, JobSchema } from './job.js';

export interface JobLine {
  readonly line: string;
  readonly number: number; // in the file of jobs, from 1
}

/** One line of a file of jobs to one line of answer. A line that is no job is answered with an error in its place. */
export function answerLine({ line, number }: JobLine, besides: string | undefined): string {
  const where = `line ${number}`;
  const refuse = (id: unknown, message: string) =>
    JSON.stringify({ ...(id === undefined ? {} : { id }), error: { code: 'bad-setting', message, where } });
  let json: unknown;
  try {
    json = JSON.parse(line);
  } catch {
    return refuse(
      undefined,
      'This line is not JSON. Write one job a line: {"id", "calculator", "inputs", "settings"}.',
    );
  }
  const parsed = JobSchema.safeParse(json);
  if (parsed.success) return JSON.stringify(answer(parsed.data satisfies Job, besides));
  const issue = parsed.error.issues[0];
  const id = typeof json === 'object' && json !== null && 'id' in json ? json.id : undefined;
  const part = issue?.code === 'unrecognized_keys' ? issue.keys.join(', ') : issue?.path.map(String).join('.');
  return refuse(id, `This job cannot be run: ${part ? `${part}: ` : ''}${issueWords(issue)}.`);
}
