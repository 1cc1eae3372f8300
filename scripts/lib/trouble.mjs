/** Something a person has to know or do: its message is shown as it stands, without a stack. */
export class Trouble extends Error {
  /**
   * @param {string} sentence what happened and what to do
   * @param {string[]} [lines] the last lines of the program that failed
   */
  constructor(sentence, lines = []) {
    super([sentence, ...lines.map((line) => `    ${line}`)].join("\n"));
    this.name = "Trouble";
  }
}

/** What the system's error codes mean for somebody who only wants to start the product. */
const MEANINGS = new Map([
  ["EACCES", "this user has no right to it"],
  ["EPERM", "this user has no right to it"],
  ["EROFS", "the disk can only be read"],
  ["ENOSPC", "the disk is full"],
]);

/**
 * What to show a person: a sentence where there is one, everything that is known otherwise.
 *
 * @param {unknown} error
 */
export function describeError(error) {
  if (!(error instanceof Error)) return String(error);
  if (error instanceof Trouble) return error.message;
  const { code, path } = /** @type {NodeJS.ErrnoException} */ (error);
  const meaning = MEANINGS.get(code ?? "");
  return meaning && path ? `${path} could not be used: ${meaning}.` : (error.stack ?? error.message);
}
