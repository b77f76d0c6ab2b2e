/** The address of the role that owns the tables; only the operator's commands know it. */
export function findOwnerUrl(): string | undefined {
  const url = process.env['DATABASE_OWNER_URL'];
  return url === '' ? undefined : url;
}
