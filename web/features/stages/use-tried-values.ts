import { useMemo } from "react";
import { useSearchParams } from "react-router-dom";
import { RESISTOR_KEYS, type Resistors, resistorsSchema } from "#shared/schemas/circuit";

/**
 * The values that somebody tries on a kept stage. Only what was stepped stands in the address: one may go and look
 * something up, or send the attempt to somebody, and whatever else is changed meanwhile is taken in beside it.
 */
export function useTriedValues(kept: Resistors): {
  resistors: Resistors;
  tryValues: (next: Resistors) => void;
  backToKept: () => void;
} {
  const [search, setSearch] = useSearchParams();
  const resistors = useMemo(() => readTried(search, kept), [search, kept]);
  const write = (change: (params: URLSearchParams, name: keyof Resistors) => void) =>
    setSearch(
      (params) => {
        for (const name of RESISTOR_KEYS) change(params, name);
        return params;
      },
      { replace: true, preventScrollReset: true },
    );
  return {
    resistors,
    tryValues: (next) =>
      write((params, name) => {
        if (next[name] === kept[name]) params.delete(name);
        else params.set(name, String(next[name]));
      }),
    backToKept: () => write((params, name) => params.delete(name)),
  };
}

function readTried(search: URLSearchParams, kept: Resistors): Resistors {
  const tried = { ...kept };
  for (const name of RESISTOR_KEYS) {
    const text = search.get(name);
    const parsed = resistorsSchema.shape[name].safeParse(Number(text));
    // What the circuit lacks stays away, and a wire stays a wire: both are the brief's to say.
    if (text !== null && parsed.success && (parsed.data === 0) === (kept[name] === 0)) {
      tried[name] = parsed.data;
    }
  }
  return tried;
}
