/** The address of the role that owns the tables; only the operator's commands know it. */
export function findOwnerUrl(): string | undefined {
  const url = process.env['DATABASE_OWNER_URL'];
  return url === '' ? undefined : url;
}

/** The address of the role the application runs as. */
export function findDatabaseUrl(): string | undefined {
  const url = process.env['DATABASE_URL'];
  return url === '' ? undefined : url;
}
