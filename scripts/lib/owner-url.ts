/** Refuses early and in words when the address of the database's owner is missing, instead of knex connecting to whatever is near. */
export function requireOwnerUrl(): void {
  const url = process.env['DATABASE_OWNER_URL'];
  if (url === undefined || url === '') {
    throw new Error('Set DATABASE_OWNER_URL to the database and the role that owns its tables.');
  }
}
