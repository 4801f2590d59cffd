/** The Node.js this project is written for: engines in package.json. */
import { Trouble } from './trouble.mjs';

/** @throws Trouble on a Node.js too old to run the tools; a newer one is only untried. */
export function checkNode(progress) {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major < 20 || (major === 20 && minor < 19)) {
    throw new Trouble(
      `Node.js ${process.versions.node} is too old for Tenthmark.`,
      'Install Node.js 20.20 or a later 20.',
    );
  }
  if (major > 20)
    progress.say(`  Node.js ${process.versions.node}: untried. Tenthmark is tested with Node.js 20.`);
}
