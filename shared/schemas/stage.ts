import { z } from "zod";
import { briefSchema } from "./brief";
import { resistorsSchema } from "./circuit";
import { partSchema } from "./part";

export const stageName = z.string().trim().min(1, "Give the stage a name").max(120, "At most 120 characters");
export const stageNote = z.string().max(5000, "At most 5,000 characters");

/** Keeps a fit: the server freezes the part's figures and the brief as they are now. */
export const keepStageSchema = z.strictObject({
  name: stageName,
  note: stageNote.default(""),
  partId: z.int().positive(),
  resistors: resistorsSchema,
  /** The conditions the fit was ranked for. */
  brief: briefSchema,
  /** The saved brief they came from, when there is one. */
  briefId: z.int().positive().nullable().default(null),
});

export const updateStageSchema = z.strictObject({
  name: stageName,
  note: stageNote,
  resistors: resistorsSchema,
  version: z.int().positive(),
});

const person = z.object({ id: z.string(), name: z.string() });

/** A fit that somebody kept: part and brief as they were, values frozen, name and note open to edit. */
export const stageSchema = z.object({
  id: z.int().positive(),
  name: z.string(),
  note: z.string(),
  version: z.int().positive(),
  part: partSchema,
  resistors: resistorsSchema,
  brief: briefSchema,
  origin: z
    .object({ briefId: z.int().positive(), briefName: z.string(), briefVersion: z.int().positive() })
    .nullable(),
  createdBy: person,
  updatedBy: person,
  createdAt: z.iso.datetime(),
  updatedAt: z.iso.datetime(),
});

export const stageListSchema = z.object({ items: z.array(stageSchema) });

export type KeepStage = z.infer<typeof keepStageSchema>;
export type UpdateStage = z.infer<typeof updateStageSchema>;
export type Stage = z.infer<typeof stageSchema>;
