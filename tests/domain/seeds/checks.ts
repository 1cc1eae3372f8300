/** The names of the rows that do not hold, so that a failing test says which. */
export function breaking<Row>(
  rows: readonly Row[],
  nameOf: (row: Row) => string,
  holds: (row: Row) => boolean,
): string[] {
  return rows.filter((row) => !holds(row)).map(nameOf);
}

/** Spearman's rank correlation, -1 to 1, with equal values sharing their mean rank. */
export function rankCorrelation<Row>(
  rows: readonly Row[],
  first: (row: Row) => number,
  second: (row: Row) => number,
): number {
  const a = ranks(rows.map(first));
  const b = ranks(rows.map(second));
  const middle = (rows.length - 1) / 2;
  let together = 0;
  let alone = 0;
  let other = 0;
  for (let i = 0; i < rows.length; i += 1) {
    together += (a[i] - middle) * (b[i] - middle);
    alone += (a[i] - middle) ** 2;
    other += (b[i] - middle) ** 2;
  }
  return together / Math.sqrt(alone * other);
}

function ranks(values: readonly number[]): number[] {
  const places = new Map<number, { sum: number; count: number }>();
  [...values]
    .sort((a, b) => a - b)
    .forEach((value, rank) => {
      const place = places.get(value) ?? { sum: 0, count: 0 };
      places.set(value, { sum: place.sum + rank, count: place.count + 1 });
    });
  return values.map((value) => {
    const { sum, count } = places.get(value)!;
    return sum / count;
  });
}

/** True where prices are whole cents from one piece on and never rise with the quantity. */
export function fallsInWholeCents(breaks: readonly { quantity: number; cents: number }[]): boolean {
  return (
    breaks[0].quantity === 1 &&
    breaks.every(
      ({ quantity, cents }, index) =>
        Number.isInteger(cents) &&
        cents >= 1 &&
        (index === 0 || (quantity > breaks[index - 1].quantity && cents <= breaks[index - 1].cents)),
    )
  );
}
