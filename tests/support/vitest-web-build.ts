/** Set-up shared by the projects that need PostgreSQL. */
export async function setup(): Promise<void> {
  await Promise.resolve();
}
