import type { Brief } from "#shared/schemas/brief";
import type { Objective } from "#shared/schemas/fits";
import { formatQuantity } from "#shared/values/engineering";
import { Segmented } from "../../ui/segmented";

const OPTIONS: readonly { value: Objective; label: string }[] = [
  { value: "centred", label: "Best centred" },
  { value: "assured", label: "Most assured swing" },
  { value: "cost", label: "Least cost" },
];

type ObjectiveChoiceProps = {
  brief: Brief;
  objective: Objective;
  onChange: (objective: Objective) => void;
};

/** What comes first in the ranking. */
export function ObjectiveChoice({ brief, objective, onChange }: ObjectiveChoiceProps) {
  const swing = formatQuantity(brief.swing.peak, "V", { exact: true });
  return (
    <div className="md:ml-auto md:text-right">
      <Segmented label="Rank by" labelHidden options={OPTIONS} value={objective} onChange={onChange} />
      {objective === "cost" && (
        <p className="pt-1 text-quiet text-sm">Only fits whose assured swing is at least {swing}.</p>
      )}
    </div>
  );
}
