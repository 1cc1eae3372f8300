/** One formula of the page with all that belongs to it. Words may hold formulas between backquotes. */
export type MethodEntry = {
  /** The entry's place in the page's address, which figures elsewhere link to. */
  id: string;
  title: string;
  formulas: readonly string[];
  words: string;
  /** Where it comes from. */
  source: string;
  /** Where it stops holding. */
  limits?: string;
};

/** A chapter of the page. */
export type MethodSection = { id: string; title: string; opening: string; entries: readonly MethodEntry[] };
