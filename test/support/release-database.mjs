/** Jest's global tear-down: lets the test cluster go when hold-database.mjs got it. */
export default async function releaseDatabase() {
  await globalThis.tenthmarkTestDatabase?.release();
}
