import { useState } from "react";
import { TextInput } from "../../ui/text-input";

type ListInputProps = {
  value: readonly string[] | undefined;
  onChange: (value: string[] | undefined) => void;
};

/** A short list typed with commas; empty is no list. */
export function ListInput({ value, onChange }: ListInputProps) {
  const [draft, setDraft] = useState<string | null>(null);
  const commit = () => {
    if (draft === null) return;
    const items = [...new Set(draft.split(",").map((item) => item.trim()))].filter(Boolean);
    onChange(items.length > 0 ? items : undefined);
    setDraft(null);
  };
  return (
    <TextInput
      value={draft ?? value?.join(", ") ?? ""}
      placeholder="all"
      onChange={(event) => setDraft(event.target.value)}
      onBlur={commit}
      onKeyDown={(event) => event.key === "Enter" && commit()}
    />
  );
}
