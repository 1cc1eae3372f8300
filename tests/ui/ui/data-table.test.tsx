import { cleanup, render, screen, within } from "@testing-library/react";
import { userEvent } from "@testing-library/user-event";
import { afterEach, describe, expect, test, vi } from "vitest";
import { DataTable, type DataTableProps } from "../../../web/ui/data-table";
import type { DataTableColumn } from "../../../web/ui/data-table-model";

afterEach(cleanup);

type Fit = { id: string; part: string; swing: number | null; stock: number };

const fits: Fit[] = [
  { id: "a", part: "KT-N9", swing: 2.4, stock: 30 },
  { id: "b", part: "KT-N10", swing: null, stock: 10 },
  { id: "c", part: "BX-1", swing: 2.8, stock: 20 },
];

const columns: DataTableColumn<Fit>[] = [
  { id: "part", header: "part", cell: (fit) => fit.part, sortValue: (fit) => fit.part },
  {
    id: "swing",
    header: "swing",
    numeric: true,
    cell: (fit) => fit.swing ?? "—",
    sortValue: (fit) => fit.swing,
  },
  { id: "stock", header: "stock", numeric: true, cell: (fit) => fit.stock, hideable: true },
];

function show(props: Partial<DataTableProps<Fit>> = {}) {
  return render(
    <DataTable label="Ranked fits" columns={columns} rows={fits} rowId={(fit) => fit.id} {...props} />,
  );
}

const parts = () => screen.getAllByRole("rowheader").map((cell) => cell.textContent);
const activePart = () => document.activeElement?.querySelector("th")?.textContent;

describe("moving by keyboard", () => {
  test("only one row is in the tab order, at first the first", () => {
    show({ onOpen: () => {} });
    const stops = screen.getAllByRole("row").map((row) => row.getAttribute("tabindex"));
    expect(stops).toEqual([null, "0", "-1", "-1"]);
  });

  test.each([
    ["{ArrowDown}", "KT-N10"],
    ["j", "KT-N10"],
    ["{ArrowDown}{ArrowDown}{ArrowUp}", "KT-N10"],
    ["jjk", "KT-N10"],
    ["{End}", "BX-1"],
    ["{End}{Home}", "KT-N9"],
    ["{PageDown}", "BX-1"],
    ["{End}{PageUp}", "KT-N9"],
    ["{ArrowUp}", "KT-N9"],
    ["{End}{ArrowDown}", "BX-1"],
  ])("%s makes %s the active row", async (keys, part) => {
    const user = userEvent.setup();
    show({ onOpen: () => {} });
    screen.getAllByRole("row")[1].focus();
    await user.keyboard(keys);
    expect(activePart()).toBe(part);
    expect(document.activeElement?.getAttribute("tabindex")).toBe("0");
    expect(document.querySelectorAll('tbody [tabindex="0"]')).toHaveLength(1);
  });

  test("Enter opens the active row, and a click opens the row under it", async () => {
    const user = userEvent.setup();
    const onOpen = vi.fn();
    show({ onOpen });
    screen.getAllByRole("row")[1].focus();
    await user.keyboard("{ArrowDown}{Enter}");
    expect(onOpen).toHaveBeenLastCalledWith(fits[1]);
    await user.click(screen.getByText("BX-1"));
    expect(onOpen).toHaveBeenLastCalledWith(fits[2]);
  });

  test("keys and clicks in a row's own control stay there", async () => {
    const user = userEvent.setup();
    const onOpen = vi.fn();
    const withButton: DataTableColumn<Fit>[] = [
      ...columns,
      { id: "keep", header: "", name: "keep", cell: (fit) => <button type="button">Keep {fit.part}</button> },
    ];
    show({ onOpen, columns: withButton });
    const button = screen.getByRole("button", { name: "Keep KT-N10" });
    await user.click(button);
    await user.keyboard("{Enter}{ArrowDown}j");
    expect(onOpen).not.toHaveBeenCalled();
    expect(document.activeElement).toBe(button);
  });
});

describe("expanding", () => {
  const renderExpanded = (fit: Fit) => <p>More about {fit.part}</p>;

  test("Arrow Right and Arrow Left open and fold the row, Space does either", async () => {
    const user = userEvent.setup();
    show({ renderExpanded });
    const [, row] = screen.getAllByRole("row");
    row.focus();
    expect(row.getAttribute("aria-expanded")).toBe("false");
    await user.keyboard("{ArrowRight}");
    expect(screen.getByText("More about KT-N9")).toBeTruthy();
    expect(row.getAttribute("aria-expanded")).toBe("true");
    await user.keyboard("{ArrowLeft}");
    expect(screen.queryByText("More about KT-N9")).toBeNull();
    await user.keyboard(" ");
    expect(screen.getByText("More about KT-N9")).toBeTruthy();
    await user.keyboard(" ");
    expect(screen.queryByText("More about KT-N9")).toBeNull();
  });

  test("rows under a row join the movement when it is expanded", async () => {
    const user = userEvent.setup();
    const second = { id: "a2", part: "KT-N9 again", swing: 2.3, stock: 1 };
    show({ subRows: (fit) => (fit.id === "a" ? [second] : undefined) });
    screen.getAllByRole("row")[1].focus();
    await user.keyboard("{ArrowRight}{ArrowDown}");
    expect(activePart()).toBe("KT-N9 again");
    expect(document.activeElement?.getAttribute("aria-level")).toBe("2");
  });
});

describe("sorting", () => {
  const swing = () => screen.getByRole("columnheader", { name: /swing/ });

  test("a header says its order and a button changes it; a third press gives the first order back", async () => {
    const user = userEvent.setup();
    show();
    expect(swing().getAttribute("aria-sort")).toBe("none");
    const button = within(swing()).getByRole("button");
    await user.click(button);
    expect(swing().getAttribute("aria-sort")).toBe("descending");
    expect(parts()).toEqual(["BX-1", "KT-N9", "KT-N10"]);
    await user.click(button);
    expect(swing().getAttribute("aria-sort")).toBe("ascending");
    expect(parts()).toEqual(["KT-N9", "BX-1", "KT-N10"]);
    await user.click(button);
    expect(swing().getAttribute("aria-sort")).toBe("none");
    expect(parts()).toEqual(["KT-N9", "KT-N10", "BX-1"]);
  });

  test("part numbers sort as people count", async () => {
    show({ sort: { column: "part", descending: false } });
    expect(parts()).toEqual(["BX-1", "KT-N9", "KT-N10"]);
  });

  test("the page may hold the order instead", async () => {
    const user = userEvent.setup();
    const onSortChange = vi.fn();
    show({ sort: { column: "swing", descending: true }, onSortChange });
    expect(parts()).toEqual(["BX-1", "KT-N9", "KT-N10"]);
    await user.click(within(swing()).getByRole("button"));
    expect(onSortChange).toHaveBeenCalledWith({ column: "swing", descending: false });
    expect(parts()).toEqual(["BX-1", "KT-N9", "KT-N10"]);
  });
});

describe("what is shown", () => {
  test("a column can be left out and brought back", async () => {
    const user = userEvent.setup();
    show();
    const choose = async () => {
      await user.click(screen.getByRole("button", { name: "Columns" }));
      await user.click(screen.getByRole("menuitemcheckbox", { name: "stock" }));
      await user.keyboard("{Escape}");
    };
    await choose();
    expect(screen.queryByRole("columnheader", { name: "stock" })).toBeNull();
    await choose();
    expect(screen.getByRole("columnheader", { name: "stock" })).toBeTruthy();
  });

  test("a long list is drawn in parts, and moving past its end draws more", async () => {
    const user = userEvent.setup();
    const many = Array.from({ length: 25 }, (_, index) => ({
      ...fits[0],
      id: `${index}`,
      part: `P${index}`,
    }));
    show({ rows: many, pageSize: 10, onOpen: () => {} });
    expect(parts()).toHaveLength(10);
    await user.click(screen.getByRole("button", { name: "Show 10 more" }));
    expect(parts()).toHaveLength(20);
    screen.getAllByRole("row")[1].focus();
    await user.keyboard("{End}{ArrowDown}");
    expect(parts()).toHaveLength(25);
  });

  test.each([
    ["in the margin of a wide screen", true],
    ["under its row on a narrow one", false],
  ])("a note about a row stands once, %s", (_, wide) => {
    const query = vi.spyOn(window, "matchMedia").mockImplementation(
      (media) =>
        ({
          media,
          matches: wide,
          addEventListener() {},
          removeEventListener() {},
        }) as unknown as MediaQueryList,
    );
    show({ marginNote: (fit) => (fit.id === "b" ? <p>Two short</p> : null) });
    const note = screen.getByText("Two short");
    expect(note.closest("table") !== null).toBe(!wide);
    const line = wide
      ? document.querySelector(
          `[data-margin-anchor="${note.closest("[data-margin-note]")?.getAttribute("data-margin-note")}"]`,
        )
      : note.closest("tr")?.previousElementSibling;
    expect(line?.textContent).toContain("KT-N10");
    query.mockRestore();
  });

  test("an empty list says what goes there", () => {
    show({ rows: [], empty: <p>No fits yet</p> });
    expect(screen.getByText("No fits yet")).toBeTruthy();
    expect(screen.queryByRole("table")).toBeNull();
  });

  test("a table that is only read is a plain table without tab stops", () => {
    show();
    expect(screen.getByRole("table", { name: "Ranked fits" })).toBeTruthy();
    expect(document.querySelector("tbody [tabindex]")).toBeNull();
  });
});
