import type { Brief } from "#shared/schemas/brief";
import { pickResistors, resistorsOf } from "#shared/schemas/circuit";
import type { Fit } from "#shared/schemas/fits";
import { formatCents, formatCount } from "#shared/values/engineering";
import { BalanceBar } from "../../figures/balance-bar";
import { stageLink } from "../../lib/stage-link";
import type { DataTableColumn } from "../../ui/data-table-model";
import { Value } from "../../ui/value";
import { Explained } from "./explained";
import { YieldCell } from "./yield-cell";

/** What the columns are for. */
export type ColumnsContext = {
  brief: Brief;
  /** The volts that half a balance bar stands for. */
  scale: number;
  isNarrow: boolean;
  /** The ranking goes on, so the rows may still change. */
  isProvisional: boolean;
};

/** The address of a fit's sheet. */
export function linkTo(fit: Fit, brief: Brief, briefId: number | null, place: number | null): string {
  return stageLink({ partId: fit.part.id, resistors: pickResistors(fit), brief, briefId, place });
}

/** The columns of a resistor set, used for the best set of each part and for its others. */
export function setColumns(context: ColumnsContext): DataTableColumn<Fit>[] {
  const { brief, scale, isNarrow, isProvisional } = context;
  const resistors = resistorsOf(brief.circuit)
    .filter((name) => name !== "rs" || brief.sourceResistor !== "none")
    .map(
      (name): DataTableColumn<Fit> => ({
        id: name,
        header: name.toUpperCase(),
        numeric: true,
        sortValue: (fit) => fit[name],
        // Zero stands for a resistor that the circuit can do without.
        cell: (fit) => <Value number={fit[name] || null} unit="Ω" />,
      }),
    );
  const balance: DataTableColumn<Fit> = {
    id: "balance",
    header: (
      <span>
        <span className="text-ohmic">ohmic</span> ← room each way, V →{" "}
        <span className="text-cutoff-ink">cutoff</span>
      </span>
    ),
    name: "Room each way",
    className: "min-w-52",
    cell: ({ bias, assured }) =>
      bias.swing && (
        <BalanceBar
          towardOhmic={bias.swing.towardOhmic}
          towardCutoff={bias.swing.towardCutoff}
          assured={assured}
          scale={scale}
        />
      ),
  };
  const figures: DataTableColumn<Fit>[] = [
    {
      id: "centring",
      header: "off centre",
      numeric: true,
      sortValue: (fit) => fit.bias.centringError,
      cell: (fit) => <Value number={fit.bias.centringError} unit="%" decimals={1} />,
    },
    {
      id: "swing",
      header: "swing",
      numeric: true,
      sortValue: (fit) => fit.bias.swing?.symmetric,
      cell: (fit) => <Value number={fit.bias.swing?.symmetric} unit="V" />,
    },
    {
      id: "assured",
      header: <span className="inline-block w-14">assured swing</span>,
      name: "Assured swing",
      numeric: true,
      sortValue: (fit) => fit.assured.symmetric,
      cell: (fit) => <AssuredSwing volts={fit.assured.symmetric} />,
    },
    {
      id: "yield",
      header: "yield",
      numeric: true,
      // As wide as what it waits for.
      className: "min-w-[5.5rem]",
      hideable: true,
      cell: (fit) => <YieldCell brief={brief} fit={fit} isProvisional={isProvisional} />,
    },
    {
      id: "gain",
      header: "gain",
      numeric: true,
      hideable: true,
      sortValue: (fit) => Math.abs(fit.bias.gain),
      cell: (fit) => <Value number={fit.bias.gain} unit="" />,
    },
    {
      id: "current",
      header: (
        <span>
          I<sub>DQ</sub>
        </span>
      ),
      name: "Drain current",
      numeric: true,
      hideable: true,
      sortValue: (fit) => fit.bias.id,
      cell: (fit) => <Value number={fit.bias.id} unit="A" />,
    },
    {
      id: "overdrive",
      header: "overdrive",
      numeric: true,
      hideable: true,
      hidden: true,
      sortValue: (fit) => fit.bias.overdrive,
      cell: (fit) => <Value number={fit.bias.overdrive} unit="V" />,
    },
    {
      id: "supply",
      header: "supply",
      name: "Supply current",
      numeric: true,
      hideable: true,
      hidden: true,
      sortValue: (fit) => fit.supplyCurrent,
      cell: (fit) => <Value number={fit.supplyCurrent} unit="A" />,
    },
    {
      id: "input",
      header: "input",
      name: "Input resistance",
      numeric: true,
      hideable: true,
      hidden: true,
      sortValue: (fit) => fit.bias.inputResistance,
      cell: (fit) => <Value number={fit.bias.inputResistance} unit="Ω" digits={3} />,
    },
    {
      id: "distortion",
      header: "2nd harm.",
      name: "Second harmonic at the brief's peak",
      numeric: true,
      hideable: true,
      hidden: true,
      sortValue: (fit) => fit.distortion?.secondHarmonic,
      cell: (fit) => <Value number={fit.distortion?.secondHarmonic} unit="%" decimals={2} />,
    },
    {
      id: "corner",
      header: "high corner",
      numeric: true,
      hideable: true,
      hidden: true,
      sortValue: (fit) => fit.highCorner,
      cell: (fit) => <Value number={fit.highCorner} unit="Hz" />,
    },
  ];
  const cost: DataTableColumn<Fit> = {
    id: "cost",
    header: `cost of ${formatCount(brief.buildQuantity)}`,
    name: "Cost of the whole build, and of one stage",
    numeric: true,
    hideable: true,
    sortValue: (fit) => fit.cost,
    cell: (fit) => <Cost cents={fit.cost} builds={brief.buildQuantity} />,
  };
  return isNarrow ? [balance, ...resistors, ...figures, cost] : [...resistors, balance, ...figures, cost];
}

/** Zero is a figure, not a failure: the stage works, but not every build of it stays in saturation. */
function AssuredSwing({ volts }: { volts: number }) {
  if (volts > 0) return <Value number={volts} unit="V" />;
  return <Explained explanation="some builds leave saturation">0 V</Explained>;
}

/** One stage's share in cents: whole ones, but a tenth of one where that would leave a single digit. */
function shareOf(cents: number, builds: number): number {
  const share = cents / builds;
  return share < 10 ? Math.round(share * 10) / 10 : Math.round(share);
}

function Cost({ cents, builds }: { cents: number | null; builds: number }) {
  if (cents === null) return <Explained explanation="a price is missing">—</Explained>;
  return (
    <>
      <span className="block">{formatCents(cents)}</span>
      <span className="block text-quiet text-xs">
        {formatCents(shareOf(cents, builds))}
        <span className="font-sans"> each</span>
      </span>
    </>
  );
}

/** The columns of the ranked parts. */
export function fitColumns(context: ColumnsContext): DataTableColumn<Fit>[] {
  const { brief } = context;
  return [
    {
      id: "part",
      header: "part",
      sortValue: (fit) => fit.part.partNumber,
      cell: ({ part }) => (
        <span className="block">
          <span className="block font-semibold leading-5">{part.partNumber}</span>
          <span className="block text-quiet text-xs">
            {part.maker} · <span className="whitespace-nowrap">{part.package}</span>
          </span>
        </span>
      ),
    },
    ...setColumns(context),
    {
      id: "price",
      header: `transistor at ${formatCount(brief.buildQuantity)}`,
      name: "Price of the transistor",
      numeric: true,
      hideable: true,
      hidden: true,
      sortValue: (fit) => fit.part.unitPrice,
      cell: (fit) => <span className="value">{formatCents(fit.part.unitPrice)}</span>,
    },
    {
      id: "stock",
      header: "stock",
      numeric: true,
      hideable: true,
      sortValue: (fit) => fit.part.stock,
      cell: (fit) => <span className="value">{formatCount(fit.part.stock)}</span>,
    },
  ];
}
