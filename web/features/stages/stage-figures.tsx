import type { ReactNode } from "react";
import { Link } from "react-router-dom";
import { circuitOf } from "#shared/bias/circuits/registry";
import { distortionPeak, type StageSheet } from "#shared/bias/stage-sheet";
import type { Brief } from "#shared/schemas/brief";
import { formatQuantity } from "#shared/values/engineering";
import { Fact, Facts } from "../../ui/facts";
import { Value } from "../../ui/value";

type StageFiguresProps = { sheet: StageSheet; brief: Brief };

/** Every figure of the sheet with its unit, each name a way to its formula. */
export function StageFigures({ sheet, brief }: StageFiguresProps) {
  return (
    <>
      <Operating sheet={sheet} />
      <Signal sheet={sheet} brief={brief} />
      <Heat sheet={sheet} />
    </>
  );
}

function Figure({ name, anchor, children }: { name: ReactNode; anchor: string; children: ReactNode }) {
  const link = (
    <Link to={`/method#${anchor}`} className="hover:text-ink hover:underline hover:underline-offset-3">
      {name}
    </Link>
  );
  return <Fact label={link}>{children}</Fact>;
}

function Operating({ sheet }: { sheet: StageSheet }) {
  const { bias, nodes, values } = sheet;
  const { output } = circuitOf(values.circuit).signalNodes(values);
  return (
    <Facts>
      {values.vss > 0 && (
        <Figure name="Negative rail" anchor="circuit-negative-rail">
          <Value number={-values.vss} unit="V" exact />
        </Figure>
      )}
      <Figure name="Gate voltage" anchor="gate-voltage">
        <Value number={bias.vg} unit="V" />
      </Figure>
      <Figure name="Gate-source voltage" anchor="q-point">
        <Value number={bias.vgs} unit="V" />
      </Figure>
      <Figure name="Overdrive" anchor="overdrive">
        <Value number={bias.overdrive} unit="V" />
      </Figure>
      <Figure name="Drain current" anchor="drain-current">
        <Value number={bias.id} unit="A" />
      </Figure>
      <Figure name="Drain-source voltage" anchor="drain-source-voltage">
        <Value number={bias.vds} unit="V" />
      </Figure>
      <Figure
        name={output === "drain" ? "Drain (output), source to ground" : "Drain, source (output) to ground"}
        anchor="q-point"
      >
        <Value number={nodes.drain} unit="V" />, <Value number={nodes.source} unit="V" />
      </Figure>
      <Figure name="Supply current" anchor="supply-current">
        <Value number={sheet.supplyCurrent} unit="A" />
      </Figure>
    </Facts>
  );
}

function Signal({ sheet, brief }: StageFiguresProps) {
  const { bias, distortion, capacitors } = sheet;
  const peak = formatQuantity(distortionPeak(brief), "V", { exact: true });
  return (
    <Facts>
      <Figure name="Room toward ohmic, cutoff" anchor="swing">
        <Value number={bias.swing?.towardOhmic} unit="V" />,{" "}
        <Value number={bias.swing?.towardCutoff} unit="V" />
      </Figure>
      <Figure name="Symmetric swing, peak" anchor="swing">
        <Value number={bias.swing?.symmetric} unit="V" />
      </Figure>
      <Figure name="Off centre" anchor="centring-error">
        <Value number={bias.centringError} unit="%" decimals={1} />
      </Figure>
      <Figure name="Gain" anchor="gain">
        <Value number={bias.gain} unit="" digits={4} />
      </Figure>
      <Figure
        name={
          <>
            g<sub>m</sub>, r<sub>o</sub>
          </>
        }
        anchor="gm"
      >
        <Value number={bias.gm} unit="S" />,{" "}
        <Value number={bias.ro ?? Number.POSITIVE_INFINITY} unit="Ω" digits={3} />
      </Figure>
      <Figure name="Input resistance" anchor="input-resistance">
        <Value number={bias.inputResistance} unit="Ω" digits={3} />
      </Figure>
      <Figure name="Output resistance" anchor="output-resistance">
        <Value number={bias.outputResistance} unit="Ω" digits={3} />
      </Figure>
      {distortion && (
        <Figure name={`Second, third harmonic at ${peak} peak`} anchor="distortion">
          <Value number={distortion.secondHarmonic} unit="%" decimals={2} />,{" "}
          <Value number={distortion.thirdHarmonic} unit="%" decimals={2} />
        </Figure>
      )}
      {sheet.linearSwing !== null && (
        <Figure name="Largest swing at the distortion limit" anchor="linear-swing">
          <Value number={sheet.linearSwing} unit="V" />
        </Figure>
      )}
      <Figure name="High corner" anchor="high-corner">
        {sheet.highCorner === null ? "no limit" : <Value number={sheet.highCorner} unit="Hz" />}
      </Figure>
      {capacitors && (
        <Figure
          name={`Least capacitors for ${formatQuantity(brief.lowCorner.hertz, "Hz", { exact: true })}: ${capacitorNames(capacitors).join(", ")}`}
          anchor="low-corner"
        >
          {[capacitors.input, capacitors.output, capacitors.bypass]
            .filter((farads) => farads !== null)
            .map((farads) => formatQuantity(farads, "F"))
            .join(", ")}
        </Figure>
      )}
    </Facts>
  );
}

function capacitorNames({ output, bypass }: NonNullable<StageSheet["capacitors"]>): string[] {
  return ["input", ...(output === null ? [] : ["output"]), ...(bypass === null ? [] : ["bypass"])];
}

function Heat({ sheet }: { sheet: StageSheet }) {
  const { thermal, resistorPower } = sheet;
  return (
    <Facts>
      <Figure name="Dissipation, allowed" anchor="dissipation">
        <Value number={thermal.power} unit="W" />, <Value number={thermal.permitted} unit="W" />
      </Figure>
      <Figure name="Junction" anchor="junction-temperature">
        <Value number={thermal.junction} unit="°C" />
      </Figure>
      <Figure name="Hottest resistor" anchor="derating">
        <Value number={Math.max(...Object.values(resistorPower))} unit="W" />
      </Figure>
    </Facts>
  );
}
