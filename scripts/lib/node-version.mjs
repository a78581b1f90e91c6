/**
 * Ends the command with a sentence on a Node.js that is too old. The rest is loaded only afterwards, since an old one could not even read it.
 */
export function refuseOldNode() {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
  if (major > 20 || (major === 20 && minor >= 19)) return;
  console.error(`Quarterturn needs Node.js 20.19 or newer; this is ${process.versions.node}.`);
  console.error('Install a newer Node.js, then run the command again.');
  process.exit(1);
}
