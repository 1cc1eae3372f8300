const TEAMS = { "Tidewater Acoustics": "tidewater.example", "Lantern Audio Works": "lantern.example" };
const PEOPLE = ["owner", "designer", "reviewer", "librarian", "buyer", "viewer"];
const PASSWORD = "evenswing-demo";

/** Who can sign in to the demo, and how. */
export function describeDemo() {
  const teams = Object.entries(TEAMS).map(
    ([team, domain]) => `  ${team}\n${PEOPLE.map((person) => `    ${person}@${domain}`).join("\n")}`,
  );
  return `\nSign in with the password ${PASSWORD} as any of\n${teams.join("\n")}\n`;
}
