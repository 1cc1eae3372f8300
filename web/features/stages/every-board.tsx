import type { Assured } from "#shared/bias/spread";
import type { StageSheet } from "#shared/bias/stage-sheet";
import type { Component } from "#shared/bias/why/sensitivities";
import type { Build } from "#shared/schemas/bias";
import type { Brief } from "#shared/schemas/brief";
import { RESISTOR_KEYS } from "#shared/schemas/circuit";
import type { Part } from "#shared/schemas/part";
import { formatQuantity } from "#shared/values/engineering";
import { usePreferences } from "../../lib/preferences";
import { CompactTable } from "./compact-table";
import { componentValue, nameOfComponent } from "./component-words";

/** What every build inside the spread has, in words. */
export function everyBoardInWords({ swing }: Assured): string {
  if (swing.towardOhmic === 0) return "Some builds leave saturation";
  return swing.towardCutoff === 0 ? "Some builds don't conduct" : "Every board";
}

/** What binds over the spread: which room is least, and on which boards. */
export function bindingBuildInWords({ swing, worst }: Assured, { ambient }: Brief, part: Part): string {
  const isOhmic = swing.towardOhmic <= swing.towardCutoff;
  const { celsius, vt } = isOhmic ? worst.ohmic : worst.cutoff;
  const isWarm = ambient.min < ambient.max && celsius === ambient.max;
  const isCold = ambient.min < ambient.max && celsius === ambient.min;
  const boards = isWarm ? "hot boards" : isCold ? "cold boards" : "boards";
  const threshold = part.vtMin < part.vtMax ? ` with a ${vt === part.vtMin ? "low" : "high"} threshold` : "";
  return `room toward ${isOhmic ? "the ohmic region" : "cutoff"}, on ${boards}${threshold}`;
}

/** The least room each way of any build, and the two builds that set it, value by value. */
export function EveryBoard({ sheet }: { sheet: StageSheet }) {
  const { resistances } = usePreferences();
  const { swing, worst } = sheet.assured;
  const { values } = sheet;
  const row = (component: Component, of: (build: Build) => number) => ({
    id: component,
    cells: {
      name: nameOfComponent(component),
      ohmic: componentValue(component, of(worst.ohmic), resistances),
      cutoff: componentValue(component, of(worst.cutoff), resistances),
    },
  });
  return (
    <CompactTable
      title="Which boards set what every board has"
      anchor="assured-swing"
      columns={{ name: "build", ohmic: "toward ohmic", cutoff: "toward cutoff" }}
      rows={[
        {
          id: "room",
          cells: {
            name: "least room",
            ohmic: formatQuantity(swing.towardOhmic, "V"),
            cutoff: formatQuantity(swing.towardCutoff, "V"),
          },
        },
        ...RESISTOR_KEYS.filter((key) => values[key] > 0).map((key) => row(key, ({ stage }) => stage[key])),
        row("rail", ({ stage }) => stage.vdd),
        ...(values.vss > 0 ? [row("negativeRail", ({ stage }) => stage.vss)] : []),
        row("vt", ({ vt }) => vt),
        row("k", ({ k }) => k),
        {
          id: "ambient",
          cells: {
            name: "ambient",
            ohmic: formatQuantity(worst.ohmic.celsius, "°C"),
            cutoff: formatQuantity(worst.cutoff.celsius, "°C"),
          },
        },
      ]}
    />
  );
}
