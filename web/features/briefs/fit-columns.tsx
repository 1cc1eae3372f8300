import type { Brief } from "#shared/schemas/brief";
import { pickResistors, resistorsOf } from "#shared/schemas/circuit";
import type { Fit } from "#shared/schemas/fits";
import { formatCents, formatCount } from "#shared/values/engineering";
import { BalanceBar } from "../../figures/balance-bar";
import { stageLink } from "../../lib/stage-link";
import type { DataTableColumn } from "../../ui/data-table-model";
import { Value } from "../../ui/value";

/** The address of a fit's sheet. */
export function linkTo(fit: Fit, brief: Brief, briefId: number | null, place: number | null): string {
  return stageLink({ partId: fit.part.id, resistors: pickResistors(fit), brief, briefId, place });
}

/** The columns of a resistor set, used for the best set of each part and for its others. */
export function setColumns(brief: Brief, scale: number, isNarrow: boolean): DataTableColumn<Fit>[] {
  const resistors = resistorsOf(brief.circuit)
    .filter((name) => name !== "rs" || brief.sourceResistor !== "none")
    .map(
      (name): DataTableColumn<Fit> => ({
        id: name,
        header: name.toUpperCase(),
        numeric: true,
        sortValue: (fit) => fit[name],
        cell: (fit) => <Value number={fit[name]} unit="Ω" />,
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
    className: "min-w-56",
    cell: ({ bias }) =>
      bias.swing && (
        <BalanceBar
          towardOhmic={bias.swing.towardOhmic}
          towardCutoff={bias.swing.towardCutoff}
          assured={null}
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
  return isNarrow ? [balance, ...resistors, ...figures] : [...resistors, balance, ...figures];
}

/** The columns of the ranked parts. */
export function fitColumns(brief: Brief, scale: number, isNarrow: boolean): DataTableColumn<Fit>[] {
  return [
    {
      id: "part",
      header: "part",
      sortValue: (fit) => fit.part.partNumber,
      cell: ({ part }) => (
        <span className="block">
          <span className="block font-semibold leading-5">{part.partNumber}</span>
          <span className="block text-quiet text-xs">
            {part.maker} · {part.package}
          </span>
        </span>
      ),
    },
    ...setColumns(brief, scale, isNarrow),
    {
      id: "price",
      header: `each at ${formatCount(brief.buildQuantity)}`,
      name: "Price of the transistor",
      numeric: true,
      hideable: true,
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
