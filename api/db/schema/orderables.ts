import { boolean, double, index, int, json, mysqlEnum, mysqlTable, varchar } from "drizzle-orm/mysql-core";
import { key } from "./columns";

/** Money for parts that cost less than a cent each: integer cents for a thousand. */
type ThousandBreak = { quantity: number; centsPerThousand: number };

const supply = {
  id: key(),
  orderableNumber: varchar("orderable_number", { length: 60 }).notNull().unique(),
  maker: varchar("maker", { length: 120 }).notNull(),
  tolerance: double("tolerance").notNull(),
  size: varchar("size", { length: 40 }).notNull(),
  voltageRating: double("voltage_rating").notNull(),
  stock: int("stock").notNull(),
  leadTimeWeeks: int("lead_time_weeks").notNull(),
  priceBreaks: json("price_breaks").$type<ThousandBreak[]>().notNull(),
};

export const resistorOrderables = mysqlTable(
  "resistor_orderables",
  {
    ...supply,
    family: mysqlEnum("family", ["thick film", "thin film", "metal film"]).notNull(),
    series: mysqlEnum("series", ["E24", "E96"]).notNull(),
    ohms: double("ohms").notNull(),
    powerRating: double("power_rating").notNull(),
    ppmPerKelvin: double("ppm_per_kelvin").notNull(),
  },
  (table) => [index("resistors_by_tolerance").on(table.tolerance, table.ohms)],
);

export const capacitorOrderables = mysqlTable("capacitor_orderables", {
  ...supply,
  family: mysqlEnum("family", ["C0G", "X7R", "film", "electrolytic"]).notNull(),
  farads: double("farads").notNull(),
  polarised: boolean("polarised").notNull(),
});
