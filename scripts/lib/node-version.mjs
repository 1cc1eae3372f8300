// This file is read before any other, by whatever Node.js is there: it keeps to syntax that old ones know.

const LEAST = [20, 19];

/** Ends the process with a sentence where Node.js is too old, or the system isn't Linux. */
export function requireNode() {
  const [major, minor] = process.versions.node.split(".").map(Number);
  if (major < LEAST[0] || (major === LEAST[0] && minor < LEAST[1])) {
    console.error(`Evenswing needs Node.js ${LEAST.join(".")} or newer; this is ${process.versions.node}.`);
    process.exit(1);
  }
  if (process.platform !== "linux") {
    console.error(
      "These scripts run on Linux (Debian 12 is what they are tried on); this is another system.",
    );
    process.exit(1);
  }
}
