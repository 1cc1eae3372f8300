import { Link } from "react-router-dom";
import type { StageSheet } from "#shared/bias/stage-sheet";
import type { Build } from "#shared/schemas/bias";
import { resistorsOf } from "#shared/schemas/circuit";
import { formatQuantity } from "#shared/values/engineering";

/** The assured swing in words, with the builds that set it. */
export function AssuredBlock({ sheet }: { sheet: StageSheet }) {
  const { swing, worst } = sheet.assured;
  return (
    <div className="mt-2 text-sm leading-5.5">
      <p>
        <Link to="/method#assured-swing" className="hover:underline hover:underline-offset-3">
          Assured swing
        </Link>{" "}
        {swing.symmetric > 0 ? (
          <>
            <strong className="value">{formatQuantity(swing.symmetric, "V")} peak</strong>: no build inside
            the spread has less.
          </>
        ) : (
          "is 0: some builds inside the spread leave saturation or don't conduct."
        )}
      </p>
      <dl className="mt-1 grid grid-cols-[auto_auto_1fr] gap-x-3 text-quiet text-xs leading-5">
        <WorstBuild side="toward cutoff" room={swing.towardCutoff} build={worst.cutoff} />
        <WorstBuild side="toward ohmic" room={swing.towardOhmic} build={worst.ohmic} />
      </dl>
    </div>
  );
}

function WorstBuild({ side, room, build }: { side: string; room: number; build: Build }) {
  const { vt, k, celsius, stage } = build;
  const values = [
    `VT ${formatQuantity(vt, "V")}`,
    `K ${formatQuantity(k, "A/V²")}`,
    `rail ${formatQuantity(stage.vdd, "V")}`,
    ...(stage.vss > 0 ? [`negative rail ${formatQuantity(stage.vss, "V")}`] : []),
    ...resistorsOf(stage.circuit)
      .filter((key) => stage[key] > 0)
      .map((key) => `${key.toUpperCase()} ${formatQuantity(stage[key], "Ω")}`),
    formatQuantity(celsius, "°C"),
  ];
  return (
    <>
      <dt>{side}</dt>
      <dd className="value text-ink">{formatQuantity(room, "V")}</dd>
      <dd>{values.join(", ")}</dd>
    </>
  );
}
