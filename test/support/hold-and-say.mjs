/** Holds the cluster named on the command line: prints its address, and "left" once a line on standard input let it go. */
import { holdPostgres } from '../../server/cli/house/postgres.mjs';

const held = await holdPostgres(process.argv[2]);
console.log(held.url);
process.stdin.once('data', async () => {
  await held.release();
  console.log('left');
  process.exit();
});
