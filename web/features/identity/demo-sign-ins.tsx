import { may, type Role } from "#shared/permissions";
import type { DemoAccounts } from "#shared/schemas/identity";

type DemoSignInsProps = { demo: DemoAccounts; onChoose: (email: string) => void };

function whatTheyDo(role: Role): string {
  return may([role], "design:write") ? "writes briefs, keeps stages" : "looks and tries, keeps nothing";
}

/** The people of the demo: one press signs in as one of them. */
export function DemoSignIns({ demo, onChoose }: DemoSignInsProps) {
  const teams = [...new Set(demo.accounts.map(({ team }) => team))];
  return (
    <section aria-labelledby="demo-title">
      <h2 id="demo-title" className="text-lg">
        This is the demo
      </h2>
      <p className="mt-1 max-w-prose text-quiet">
        Invented people at invented companies. Choose one to sign in as; the password of all is{" "}
        <span className="value text-ink">{demo.password}</span>.
      </p>
      <div className="mt-5 grid gap-x-12 gap-y-6 lg:grid-cols-2">
        {teams.map((team) => (
          <div key={team}>
            <h3 className="border-ink border-b pb-1.5 font-medium text-sm">{team}</h3>
            <ul>
              {demo.accounts
                .filter((account) => account.team === team)
                .map(({ email, role }) => (
                  <li key={email} className="border-rule border-b">
                    <button
                      type="button"
                      onClick={() => onChoose(email)}
                      className="flex w-full flex-wrap items-baseline justify-between gap-x-4 py-2 text-left hover:bg-panel"
                    >
                      <span>{email}</span>
                      <span className="text-quiet text-sm">{whatTheyDo(role)}</span>
                    </button>
                  </li>
                ))}
            </ul>
          </div>
        ))}
      </div>
    </section>
  );
}
