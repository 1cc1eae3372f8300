import { Link, NavLink, useNavigate } from "react-router-dom";
import type { Me } from "#shared/schemas/identity";
import { problemOf } from "../../lib/api";
import { setPreferences, usePreferences } from "../../lib/preferences";
import { useSignOut, useSwitchTeam } from "../../lib/session";
import { Button } from "../../ui/button";
import { classNames } from "../../ui/class-names";
import { Logo } from "../../ui/logo";
import { Menu, MenuCheckboxItem, MenuItem, MenuLabel, MenuSeparator } from "../../ui/menu";
import { showToast } from "../../ui/toast";

const THEMES = [
  { value: "system", label: "As the system" },
  { value: "light", label: "Light" },
  { value: "dark", label: "Dark" },
] as const;

const RESISTANCE_STYLES = [
  { value: "rkm", label: "4k7" },
  { value: "spelled", label: "4.7 kΩ" },
] as const;

/** The line at the top of every page. */
export function TopBar({ me }: { me: Me | null }) {
  return (
    <header data-no-print="" className="border-rule border-b">
      <div className="page flex min-h-15 flex-wrap items-center gap-x-7 gap-y-1 py-2">
        <Link to={me ? "/" : "/method"} aria-label="Evenswing, home">
          <Logo />
        </Link>
        <nav aria-label="Pages" className="order-last flex w-full gap-x-6 sm:order-none sm:w-auto">
          {me && <TopLink to="/briefs">Briefs</TopLink>}
          {me && <TopLink to="/stages">Stages</TopLink>}
          <TopLink to="/method">Method</TopLink>
        </nav>
        <div className="-mr-4 ml-auto">
          {me ? (
            <PersonMenu me={me} />
          ) : (
            <Button asChild variant="quiet">
              <Link to="/sign-in">Sign in</Link>
            </Button>
          )}
        </div>
      </div>
    </header>
  );
}

function TopLink({ to, children }: { to: string; children: string }) {
  return (
    <NavLink
      to={to}
      className={({ isActive }) => classNames("py-1 hover:text-ink", isActive ? "text-ink" : "text-quiet")}
    >
      {children}
    </NavLink>
  );
}

function PersonMenu({ me }: { me: Me }) {
  const { theme, resistances } = usePreferences();
  const signOut = useSignOut();
  const switchTeam = useSwitchTeam();
  const navigate = useNavigate();
  const tell = (error: unknown) => showToast(problemOf(error).title, { tone: "caution" });
  return (
    <Menu
      align="end"
      trigger={
        <Button variant="quiet" aria-label={`${me.user.name}, ${me.team.name}: menu`}>
          <span>
            <span className="hidden sm:inline">{me.team.name} · </span>
            {me.user.name}
          </span>
        </Button>
      }
    >
      <MenuLabel>
        {me.user.email}
        <span className="block font-normal">{me.team.roles.join(", ")}</span>
      </MenuLabel>
      {me.teams.length > 1 && (
        <>
          <MenuSeparator />
          <MenuLabel>Team</MenuLabel>
          {me.teams.map((team) => (
            <MenuCheckboxItem
              key={team.id}
              checked={team.id === me.team.id}
              onCheckedChange={() =>
                switchTeam.mutate(team.id, { onSuccess: () => navigate("/"), onError: tell })
              }
            >
              {team.name}
            </MenuCheckboxItem>
          ))}
        </>
      )}
      <MenuSeparator />
      <MenuLabel>Colours</MenuLabel>
      {THEMES.map(({ value, label }) => (
        <MenuCheckboxItem
          key={value}
          checked={theme === value}
          onCheckedChange={() => setPreferences({ theme: value })}
        >
          {label}
        </MenuCheckboxItem>
      ))}
      <MenuSeparator />
      <MenuLabel>Resistances</MenuLabel>
      {RESISTANCE_STYLES.map(({ value, label }) => (
        <MenuCheckboxItem
          key={value}
          checked={resistances === value}
          onCheckedChange={() => setPreferences({ resistances: value })}
        >
          <span className="value">{label}</span>
        </MenuCheckboxItem>
      ))}
      <MenuSeparator />
      <MenuItem asChild>
        <a href="/api/v1/docs/">API</a>
      </MenuItem>
      <MenuItem
        onSelect={() => signOut.mutate(undefined, { onSuccess: () => navigate("/sign-in"), onError: tell })}
      >
        Sign out
      </MenuItem>
    </Menu>
  );
}
