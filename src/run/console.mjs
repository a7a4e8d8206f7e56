/** One plain line on the terminal. */
export const say = (line) => process.stdout.write(`${line}\n`);

/** Says what could not be done and ends. */
export function fail(line) {
  process.stderr.write(`\n${line}\n`);
  process.exit(1);
}

/** Ends early, in words, where Node.js is too old. */
export function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major < 20 || (major === 20 && minor < 19))
    fail(
      `Thrum needs Node.js 20.19 or newer; this is ${process.versions.node}. Install the package nodejs of a newer release.`,
    );
}
