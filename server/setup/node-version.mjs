import { SetupError } from './fail.mjs';

const oldest = [20, 19];

/** @throws SetupError on a Node.js that is too old */
export function checkNode(version = process.versions.node) {
  const [major, minor] = version.split('.').map(Number);
  if (major > oldest[0] || (major === oldest[0] && minor >= oldest[1])) return;
  throw new SetupError(`Node.js ${oldest.join('.')} or newer is needed, this is ${version}`);
}
