/** How one kind of figure is written into a field of a data file and read back. */
export interface Field<Value> {
  write(value: Value): string;
  /** @throws {RangeError} where the text is no such value */
  read(text: string): Value;
}

/** One field for each property of a record; their order is the order of the columns. */
export type Columns<Row> = { readonly [Name in keyof Row]: Field<Row[Name]> };

export const text: Field<string> = {
  write(value) {
    if (/[,"\n]/.test(value))
      throw new RangeError(`A field holds no comma, quote or line end, given ${value}`);
    return value;
  },
  read: (written) => written,
};

/** A number in its shortest form, as in 4.7e-12. */
export const number: Field<number> = {
  write: String,
  read(written) {
    const value = Number(written);
    if (written === "" || !Number.isFinite(value))
      throw new RangeError(`Expected a number, given "${written}"`);
    return value;
  },
};

export const flag: Field<boolean> = {
  write: (value) => (value ? "yes" : "no"),
  read: (written) => oneOf(["yes", "no"]).read(written) === "yes",
};

/** One of a few words. */
export function oneOf<Word extends string>(words: readonly Word[]): Field<Word> {
  return {
    write: (value) => value,
    read(written) {
      const word = words.find((each) => each === written);
      if (word === undefined) throw new RangeError(`Expected one of ${words.join(", ")}, given "${written}"`);
      return word;
    },
  };
}

/** Price breaks as quantity:cents, as in 1:34;10:28. */
export function priceBreaks<Price extends string>(
  price: Price,
): Field<({ quantity: number } & Record<Price, number>)[]> {
  return {
    write: (breaks) => breaks.map((each) => `${each.quantity}:${each[price]}`).join(";"),
    read: (written) =>
      written.split(";").map((step) => {
        const [quantity, cents] = step.split(":");
        return { quantity: number.read(quantity), [price]: number.read(cents ?? "") } as {
          quantity: number;
        } & Record<Price, number>;
      }),
  };
}

/** Writes records as comma-separated lines under one line of column names. */
export function writeTable<Row>(columns: Columns<Row>, rows: readonly Row[]): string {
  const names = Object.keys(columns) as (keyof Row & string)[];
  const lines = rows.map((row) => names.map((name) => columns[name].write(row[name])).join(","));
  return `${[names.join(","), ...lines].join("\n")}\n`;
}

/**
 * Reads back what `writeTable` wrote.
 *
 * @throws {RangeError} where the column names differ or a field does not read, naming the line
 */
export function readTable<Row>(columns: Columns<Row>, table: string): Row[] {
  const names = Object.keys(columns) as (keyof Row & string)[];
  const [header, ...lines] = table.trimEnd().split("\n");
  if (header !== names.join(",")) {
    throw new RangeError(`Expected the columns ${names.join(",")}, given ${header}`);
  }
  return lines.map((line, index) => {
    const fields = line.split(",");
    const where = `line ${index + 2}`;
    if (fields.length !== names.length) {
      throw new RangeError(`Expected ${names.length} fields, given ${fields.length} (${where})`);
    }
    const entries = names.map((name, place) => {
      try {
        return [name, columns[name].read(fields[place])];
      } catch (cause) {
        throw new RangeError(`${name} does not read (${where})`, { cause });
      }
    });
    return Object.fromEntries(entries) as Row;
  });
}
