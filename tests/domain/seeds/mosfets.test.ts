import { describe, expect, it } from "vitest";
import { readMosfets } from "../../../seeds/catalog/read";
import { breaking, fallsInWholeCents, rankCorrelation } from "./checks";

const mosfets = readMosfets();
const nameOf = ({ partNumber }: { partNumber: string }) => partNumber;
const share = (count: number) => count / mosfets.length;

describe("the MOSFET catalog", () => {
  it("lists some 1,260 parts of ten makers in nine packages, seven in ten of them N-channel", () => {
    expect(mosfets).toHaveLength(1260);
    expect(new Set(mosfets.map((part) => part.maker)).size).toBe(10);
    expect(new Set(mosfets.map((part) => part.package)).size).toBe(9);
    expect(share(mosfets.filter((part) => part.polarity === "n").length)).toBeCloseTo(0.7, 2);
  });

  it("gives no two parts a number that differs only in case or punctuation", () => {
    const plain = mosfets.map((part) => part.partNumber.toLowerCase().replaceAll(/[^a-z0-9]/g, ""));
    expect(new Set(plain).size).toBe(mosfets.length);
  });

  it("keeps to numbers that no real family of transistors begins with", () => {
    const real =
      /^(1N|2N|2SJ|2SK|3N|AO|AP|BF|BS|BUK|BUZ|CSD|DMG|DMN|DMP|FD|FQ|IPB|IPD|IPP|IRF|IRL|LND|MMBF|NDS|NTR|PMV|RK7|RU|SI|SQ|SSM|STD|STP|TN0|TP0|VN|VP|ZV)/i;
    expect(breaking(mosfets, nameOf, (part) => !real.test(part.partNumber))).toEqual([]);
  });

  it("mounts leaded outlines through holes and the others on the surface", () => {
    const leaded = new Set(
      mosfets.filter((part) => part.mounting === "through-hole").map((part) => part.package),
    );
    expect([...leaded].sort()).toEqual(["TO-220", "TO-92"]);
  });

  it("spreads the threshold 1.5 to 3 times from least to greatest, the typical one between", () => {
    const holds = ({ vtMin, vtTyp, vtMax }: (typeof mosfets)[number]) => {
      const ratio = vtTyp > 0 ? vtMax / vtMin : vtMin / vtMax;
      return vtMin < vtTyp && vtTyp < vtMax && ratio >= 1.5 && ratio <= 3;
    };
    expect(breaking(mosfets, nameOf, holds)).toEqual([]);
  });

  it("has twelve depletion-mode parts, all N-channel, and otherwise thresholds above zero throughout", () => {
    const depletion = mosfets.filter((part) => part.vtTyp < 0);
    expect(depletion).toHaveLength(12);
    expect(breaking(depletion, nameOf, (part) => part.polarity === "n" && part.vtMax < 0)).toEqual([]);
    expect(breaking(mosfets, nameOf, (part) => part.vtMin > 0 || part.vtMax < 0)).toEqual([]);
  });

  it("spreads the conduction parameter 30 to 50 % to each side", () => {
    const within = (fraction: number) => fraction >= 0.3 && fraction <= 0.5;
    const holds = ({ kMin, kTyp, kMax }: (typeof mosfets)[number]) =>
      within(1 - kMin / kTyp) && within(kMax / kTyp - 1);
    expect(breaking(mosfets, nameOf, holds)).toEqual([]);
  });

  it("keeps λ at 0.002 to 0.03 per volt, falling with the drain rating", () => {
    expect(breaking(mosfets, nameOf, ({ lambda }) => lambda >= 0.002 && lambda <= 0.03)).toEqual([]);
    expect(
      rankCorrelation(
        mosfets,
        (part) => part.vdss,
        (part) => part.lambda,
      ),
    ).toBeLessThan(-0.9);
  });

  it("lets the threshold drift by -2 to -5 mV/K", () => {
    expect(breaking(mosfets, nameOf, ({ tcVt }) => tcVt <= -2e-3 && tcVt >= -5e-3)).toEqual([]);
  });

  it("keeps the feedback capacitance below the other two", () => {
    expect(
      breaking(mosfets, nameOf, ({ ciss, coss, crss }) => crss > 0 && crss < coss && crss < ciss),
    ).toEqual([]);
  });

  it("rates parts in standard steps of drain and gate voltage", () => {
    const steps = [12, 20, 30, 40, 60, 80, 100, 150, 200, 250, 400, 450];
    expect(breaking(mosfets, nameOf, ({ vdss }) => steps.includes(vdss))).toEqual([]);
    expect(breaking(mosfets, nameOf, ({ vgss }) => [8, 12, 20, 30].includes(vgss))).toEqual([]);
    expect(new Set(mosfets.map((part) => part.vdss)).size).toBe(steps.length);
  });

  it("rates the power at what lifts the junction to its limit in still air, rounded down", () => {
    const holds = ({ pd25, rthJa, tjMax }: (typeof mosfets)[number]) => {
      const exact = (tjMax - 25) / rthJa;
      return pd25 <= exact * (1 + 1e-9) && pd25 > exact * 0.9;
    };
    expect(breaking(mosfets, nameOf, holds)).toEqual([]);
  });

  it.each([
    ["SC-70", 400, 600],
    ["SOT-323", 400, 600],
    ["DFN-3", 400, 600],
    ["SOT-23", 300, 400],
    ["TO-92", 150, 350],
    ["SOT-89", 60, 120],
    ["SOT-223", 60, 120],
    ["TO-252", 60, 120],
    ["TO-220", 50, 65],
  ])("gives %s a thermal resistance of %i to %i K/W", (outline, least, greatest) => {
    const housed = mosfets.filter((part) => part.package === outline);
    expect(housed.length).toBeGreaterThan(20);
    expect(breaking(housed, nameOf, ({ rthJa }) => rthJa >= least && rthJa <= greatest)).toEqual([]);
  });

  it("promises no current that the channel can't carry inside the gate's limit", () => {
    const holds = ({ idMax, kTyp, vgss, vtTyp }: (typeof mosfets)[number]) =>
      idMax > 0 && idMax <= kTyp * (vgss - vtTyp) ** 2;
    expect(breaking(mosfets, nameOf, holds)).toEqual([]);
  });

  it("promises no current whose heat in the channel exceeds the power rating", () => {
    const holds = ({ idMax, kTyp, vgss, vtTyp, pd25 }: (typeof mosfets)[number]) =>
      idMax ** 2 / (2 * kTyp * (vgss - vtTyp)) <= pd25;
    expect(breaking(mosfets, nameOf, holds)).toEqual([]);
  });

  it.each(["n", "p"])(
    "lets current and capacitance rise with the conduction parameter (%s-channel)",
    (polarity) => {
      const parts = mosfets.filter((part) => part.polarity === polarity);
      expect(
        rankCorrelation(
          parts,
          (part) => part.kTyp,
          (part) => part.idMax,
        ),
      ).toBeGreaterThan(0.9);
      expect(
        rankCorrelation(
          parts,
          (part) => part.kTyp,
          (part) => part.ciss,
        ),
      ).toBeGreaterThan(0.9);
    },
  );

  it("gives parts of the same size less capacitance where the drain rating is higher", () => {
    const perConduction = (part: (typeof mosfets)[number]) => part.coss / part.ciss;
    expect(rankCorrelation(mosfets, (part) => part.vdss, perConduction)).toBeLessThan(-0.8);
  });

  it("prices each part in whole cents from one piece on, never rising with the quantity", () => {
    const holds = ({ priceBreaks }: (typeof mosfets)[number]) =>
      fallsInWholeCents(priceBreaks.map(({ quantity, unitPrice }) => ({ quantity, cents: unitPrice })));
    expect(breaking(mosfets, nameOf, holds)).toEqual([]);
  });

  it("asks more for larger dies and packages", () => {
    const active = mosfets.filter((part) => part.lifecycle === "active");
    expect(
      rankCorrelation(
        active,
        (part) => part.ciss,
        (part) => part.priceBreaks[0].unitPrice,
      ),
    ).toBeGreaterThan(0.5);
  });

  it("keeps few obsolete parts on the shelf, and whole pieces and weeks everywhere", () => {
    const obsolete = mosfets.filter((part) => part.lifecycle === "obsolete");
    expect(share(obsolete.length)).toBeCloseTo(0.06, 1);
    expect(breaking(obsolete, nameOf, ({ stock }) => stock <= 400)).toEqual([]);
    const holds = ({ stock, leadTimeWeeks }: (typeof mosfets)[number]) =>
      Number.isInteger(stock) && stock >= 0 && Number.isInteger(leadTimeWeeks) && leadTimeWeeks > 0;
    expect(breaking(mosfets, nameOf, holds)).toEqual([]);
  });

  it("offers plenty for a 12 V first stage, a 24 V line driver and a 3.0 V coin cell", () => {
    const inStock = mosfets.filter((part) => part.lifecycle === "active" && part.stock > 0);
    const firstStage = inStock.filter(({ kTyp, vdss }) => kTyp >= 1e-3 && kTyp <= 50e-3 && vdss >= 20);
    const lineDriver = inStock.filter(({ vdss, pd25, kTyp }) => vdss >= 40 && pd25 >= 0.3 && kTyp >= 5e-3);
    const coinCell = inStock.filter(({ vtMin, vtMax }) => vtMin > 0 && vtMax < 1.2);
    expect(firstStage.length).toBeGreaterThan(250);
    expect(lineDriver.length).toBeGreaterThan(150);
    expect(coinCell.length).toBeGreaterThan(150);
  });
});
