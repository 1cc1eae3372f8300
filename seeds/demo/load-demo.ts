import { eq } from "drizzle-orm";
import { DEMO_PASSWORD, DEMO_TEAMS } from "#shared/demo";
import { ROLES } from "#shared/permissions";
import { briefSchema } from "#shared/schemas/brief";
import { pickResistors } from "#shared/schemas/circuit";
import type { Database, Transaction } from "../../api/db/client";
import { users } from "../../api/db/schema/identity";
import { membershipRoles, memberships, teams } from "../../api/db/schema/teams";
import { insertBrief } from "../../api/features/briefs/queries";
import { hashPassword } from "../../api/features/identity/password";
import { selectAllParts } from "../../api/features/parts/queries";
import { insertStage } from "../../api/features/stages/queries";
import { rankFits } from "../../api/ranking/rank-fits";
import { BRIEFS, PEOPLE } from "./story";

/** When the story begins; each of its events comes an hour after the one before. */
const STORY_BEGINS = Date.UTC(2026, 10, 2, 9, 0, 0);
const ONE_HOUR_MS = 3_600_000;
/** The rating of the largest resistors in the catalog, W. */
const LARGEST_RATING = 1;

/** Writes the demo teams with their people, briefs and stages, all or nothing; once. */
export async function loadDemo(db: Database): Promise<void> {
  const [there] = await db.select({ id: teams.id }).from(teams).where(eq(teams.name, DEMO_TEAMS[0].name));
  if (there) return;
  const passwordHash = await hashPassword(DEMO_PASSWORD);
  await db.transaction(async (transaction) => {
    let now = STORY_BEGINS;
    const next = () => {
      now += ONE_HOUR_MS;
      return new Date(now);
    };
    for (const { name, domain } of DEMO_TEAMS) {
      const teamId = await insertTeam(transaction, name, domain, passwordHash, next());
      for (const story of BRIEFS.filter(({ team }) => team === name)) {
        await insertStory(transaction, teamId, `designer@${domain}`, story, next);
      }
    }
  });
}

async function insertTeam(
  db: Transaction,
  name: string,
  domain: string,
  passwordHash: string,
  createdAt: Date,
): Promise<number> {
  const [{ id: teamId }] = await db.insert(teams).values({ name, createdAt }).$returningId();
  for (const role of ROLES) {
    const email = `${role}@${domain}`;
    await db.insert(users).values({ id: email, email, name: PEOPLE[name][role], passwordHash, createdAt });
    await db.insert(memberships).values({ teamId, userId: email, createdAt });
    await db.insert(membershipRoles).values({ teamId, userId: email, role });
  }
  return teamId;
}

/** A brief and the stage kept from it: the first fit whose overdrive is high enough to trust the square law. */
async function insertStory(
  db: Transaction,
  teamId: number,
  userId: string,
  story: (typeof BRIEFS)[number],
  next: () => Date,
): Promise<void> {
  const brief = briefSchema.parse(story.brief);
  const briefId = await insertBrief(db, teamId, { name: story.name, brief, userId, now: next() });
  if (!story.stage) return;
  const parts = await selectAllParts(db, teamId);
  const supply = { rating: LARGEST_RATING, stocked: null, prices: new Map() };
  const { fits } = await rankFits(
    { brief, objective: "centred", distinct: "part", limit: 5000 },
    parts,
    supply,
  );
  const best = fits.find(({ cautions }) => cautions.every(({ code }) => code !== "low-overdrive"));
  const part = parts.find(({ id }) => id === best?.part.id);
  if (!best || !part) throw new Error(`Nothing in the catalog fits the demo brief "${story.name}"`);
  const stage = {
    ...story.stage,
    part,
    resistors: pickResistors(best),
    brief,
    origin: { briefId, briefName: story.name, briefVersion: 1 },
  };
  await insertStage(db, teamId, stage, userId, next());
}
