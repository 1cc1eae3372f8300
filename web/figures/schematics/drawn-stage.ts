import type { Brief } from "#shared/schemas/brief";

/** What of a stage changes its drawing. */
export type DrawnStage = { channel: "n" | "p"; sourceResistor: Brief["sourceResistor"] };
