import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  type Columns,
  flag,
  number,
  oneOf,
  priceBreaks,
  readTable,
  text,
  writeTable,
} from "../../../seeds/catalog/columns";

interface Row {
  name: string;
  volts: number;
  colour: "red" | "blue";
  polarised: boolean;
  priceBreaks: { quantity: number; unitPrice: number }[];
}

const columns: Columns<Row> = {
  name: text,
  volts: number,
  colour: oneOf(["red", "blue"]),
  polarised: flag,
  priceBreaks: priceBreaks("unitPrice"),
};

const row: fc.Arbitrary<Row> = fc.record({
  name: fc.stringMatching(/^[A-Za-z0-9][A-Za-z0-9 &.-]*$/),
  volts: fc.double({ noNaN: true, noDefaultInfinity: true }).filter((value) => !Object.is(value, -0)),
  colour: fc.constantFrom("red", "blue"),
  polarised: fc.boolean(),
  priceBreaks: fc.array(fc.record({ quantity: fc.nat(), unitPrice: fc.nat() }), { minLength: 1 }),
});

describe("a data file", () => {
  it("reads back exactly what was written", () => {
    fc.assert(
      fc.property(fc.array(row, { minLength: 1 }), (rows) => {
        expect(readTable(columns, writeTable(columns, rows))).toEqual(rows);
      }),
    );
  });

  it("is plain text with one line of column names", () => {
    const rows: Row[] = [
      {
        name: "A-1",
        volts: 4.7e-12,
        colour: "red",
        polarised: false,
        priceBreaks: [
          { quantity: 1, unitPrice: 34 },
          { quantity: 10, unitPrice: 28 },
        ],
      },
    ];
    expect(writeTable(columns, rows)).toBe(
      "name,volts,colour,polarised,priceBreaks\nA-1,4.7e-12,red,no,1:34;10:28\n",
    );
  });

  it.each([
    ["a number that is none", "A,much,red,no,1:34", /volts does not read \(line 2\)/],
    ["a missing number", "A,,red,no,1:34", /volts does not read \(line 2\)/],
    ["an unknown word", "A,1,green,no,1:34", /colour does not read \(line 2\)/],
    ["a price without cents", "A,1,red,no,1", /priceBreaks does not read \(line 2\)/],
    ["a field too few", "A,1,red,no", /Expected 5 fields, given 4 \(line 2\)/],
  ])("refuses %s and says where", (_what, line, message) => {
    expect(() => readTable(columns, `name,volts,colour,polarised,priceBreaks\n${line}\n`)).toThrow(message);
  });

  it("refuses other columns than its own", () => {
    expect(() => readTable(columns, "name,volts\nA,1\n")).toThrow(/Expected the columns name,volts,colour/);
  });

  it("refuses to write a name that would break the line", () => {
    const rows: Row[] = [{ name: "A, B", volts: 1, colour: "red", polarised: true, priceBreaks: [] }];
    expect(() => writeTable(columns, rows)).toThrow(/no comma/);
  });
});
