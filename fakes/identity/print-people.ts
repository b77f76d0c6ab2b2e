/** Writes the stand-in's people as the sign-in page lists them; the launcher hands them on. */
import { demoPeople } from './people.ts';

const words: Readonly<Record<string, string>> = {
  safety: 'safety officer',
  admin: 'administrator',
};

const listed = demoPeople.map(({ sub, name, roles, note }) => {
  const [role, site] = (roles[0] ?? '').split('@');
  return { sub, name, role: words[role ?? ''] ?? role, ...(site ? { site } : {}), note };
});
process.stdout.write(JSON.stringify(listed));
