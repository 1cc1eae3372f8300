import {
  double,
  index,
  int,
  json,
  mysqlEnum,
  mysqlTable,
  uniqueIndex,
  varchar,
} from "drizzle-orm/mysql-core";
import { LIFECYCLES, type PriceBreak } from "#shared/schemas/part";
import { key, keyOf } from "./columns";
import { teams } from "./teams";

/** MOSFETs in SI units; `teamId` null is the catalog that all teams share. */
export const parts = mysqlTable(
  "parts",
  {
    id: key(),
    teamId: keyOf("team_id").references(() => teams.id, { onDelete: "cascade" }),
    partNumber: varchar("part_number", { length: 60 }).notNull(),
    maker: varchar("maker", { length: 120 }).notNull(),
    polarity: mysqlEnum("polarity", ["n", "p"]).notNull(),
    package: varchar("package", { length: 40 }).notNull(),
    mounting: mysqlEnum("mounting", ["surface", "through-hole"]).notNull(),
    vtMin: double("vt_min").notNull(),
    vtTyp: double("vt_typ").notNull(),
    vtMax: double("vt_max").notNull(),
    kMin: double("k_min").notNull(),
    kTyp: double("k_typ").notNull(),
    kMax: double("k_max").notNull(),
    lambda: double("lambda").notNull(),
    tcVt: double("tc_vt").notNull(),
    ciss: double("ciss").notNull(),
    coss: double("coss").notNull(),
    crss: double("crss").notNull(),
    vdss: double("vdss").notNull(),
    vgss: double("vgss").notNull(),
    idMax: double("id_max").notNull(),
    pd25: double("pd25").notNull(),
    rthJa: double("rth_ja").notNull(),
    tjMax: double("tj_max").notNull(),
    lifecycle: mysqlEnum("lifecycle", LIFECYCLES).notNull(),
    stock: int("stock").notNull(),
    leadTimeWeeks: int("lead_time_weeks").notNull(),
    priceBreaks: json("price_breaks").$type<PriceBreak[]>().notNull(),
  },
  (table) => [
    uniqueIndex("parts_by_team_and_number").on(table.teamId, table.maker, table.partNumber),
    index("parts_by_number").on(table.partNumber, table.id),
  ],
);
