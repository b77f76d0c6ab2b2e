import { z } from 'zod';
import { environmentSchema } from './config.ts';

const head = `# Settings of the server and the worker, read from the environment of both.
# The launcher (npm start) fills in whatever is missing for a demo on this machine.
# Written from server/config.ts: npm run env:example
`;

/** For the operator's commands only; the server and the worker must not know it. */
const ownerLines = `# PostgreSQL address of the role that owns the tables; for migrating only
# DATABASE_OWNER_URL=
`;

/** The text of `.env.example`: what must be set stands open, what may be set stands commented out. */
export function writeEnvExample(): string {
  const entries = Object.entries(environmentSchema.shape).map(([name, field]) => {
    const isRequired = !field.safeParse(undefined).success;
    const fallback = isRequired ? '' : showFallback(field.parse(undefined));
    const remark = isRequired ? ' (must be set)' : '';
    return `# ${field.description ?? ''}${remark}\n${isRequired ? '' : '# '}${name}=${fallback}\n`;
  });
  return [head, ...entries, ownerLines].join('\n');
}

function showFallback(value: unknown): string {
  return value === undefined
    ? ''
    : (z.union([z.string(), z.number().transform(String)]).safeParse(value).data ??
        JSON.stringify(value));
}
