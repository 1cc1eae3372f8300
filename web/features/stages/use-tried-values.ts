import { useMemo } from "react";
import { useSearchParams } from "react-router-dom";
import { type Resistors, resistorsSchema } from "#shared/schemas/stage";

const NAMES = ["r1", "r2", "rd", "rs"] as const;

/**
 * The values that somebody tries on a kept stage. They stand in the address, so that one may go and look something up
 * or send the attempt to somebody, and it is still there.
 *
 * @returns the values as tried, and what sets them
 */
export function useTriedValues(kept: Resistors): [Resistors, (next: Resistors) => void] {
  const [search, setSearch] = useSearchParams();
  const tried = useMemo(() => readTried(search, kept), [search, kept]);
  const setTried = (next: Resistors) =>
    setSearch(
      (params) => {
        for (const name of NAMES) {
          if (next[name] === kept[name]) params.delete(name);
          else params.set(name, String(next[name]));
        }
        return params;
      },
      { replace: true, preventScrollReset: true },
    );
  return [tried, setTried];
}

function readTried(search: URLSearchParams, kept: Resistors): Resistors {
  const tried = { ...kept };
  for (const name of NAMES) {
    const text = search.get(name);
    const parsed = resistorsSchema.shape[name].safeParse(Number(text));
    // A wire stays a wire: whether there is a source resistor is the brief's to say.
    if (text !== null && parsed.success && (parsed.data === 0) === (kept[name] === 0))
      tried[name] = parsed.data;
  }
  return tried;
}
