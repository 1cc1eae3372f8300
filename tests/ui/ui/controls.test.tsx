import { act, cleanup, render, screen } from "@testing-library/react";
import { userEvent } from "@testing-library/user-event";
import { useState } from "react";
import { afterEach, describe, expect, test, vi } from "vitest";
import { Button } from "../../../web/ui/button";
import { Checkbox } from "../../../web/ui/checkbox";
import { ConfirmDialog, Dialog } from "../../../web/ui/dialog";
import { Field } from "../../../web/ui/field";
import { Menu, MenuItem } from "../../../web/ui/menu";
import { Popover } from "../../../web/ui/popover";
import { ProblemMessage } from "../../../web/ui/problem-message";
import { Progress } from "../../../web/ui/progress";
import { Segmented } from "../../../web/ui/segmented";
import { Select } from "../../../web/ui/select";
import { Slider } from "../../../web/ui/slider";
import { Stepper } from "../../../web/ui/stepper";
import { TextArea, TextInput } from "../../../web/ui/text-input";
import { showUndoToast, Toaster } from "../../../web/ui/toast";
import { Tooltip } from "../../../web/ui/tooltip";
import { ResistanceStyleProvider, Value } from "../../../web/ui/value";

afterEach(cleanup);

type Objective = "centred" | "assured";

function RankBy({ onChange }: { onChange: (by: Objective) => void }) {
  const [by, setBy] = useState<Objective>("centred");
  return (
    <Segmented
      label="Rank by"
      value={by}
      onChange={(next) => {
        setBy(next);
        onChange(next);
      }}
      options={[
        { value: "centred", label: "centring" },
        { value: "assured", label: "assured swing" },
      ]}
    />
  );
}

function Ambient() {
  const [celsius, setCelsius] = useState(25);
  return (
    <Slider
      label="Ambient"
      value={celsius}
      onChange={setCelsius}
      min={-10}
      max={50}
      format={(value) => `${value} °C`}
    />
  );
}

describe("Button", () => {
  test("ignores clicks while it is busy, says so, and keeps the focus", async () => {
    const user = userEvent.setup();
    const onClick = vi.fn();
    render(
      <Button busy onClick={onClick}>
        Save
      </Button>,
    );
    const button = screen.getByRole("button", { name: "Save" });
    await user.click(button);
    expect(onClick).not.toHaveBeenCalled();
    expect(button.getAttribute("aria-busy")).toBe("true");
    expect(document.activeElement).toBe(button);
  });

  test("a busy submit button doesn't send its form again", async () => {
    const user = userEvent.setup();
    const onSubmit = vi.fn((event: { preventDefault: () => void }) => event.preventDefault());
    render(
      <form onSubmit={onSubmit}>
        <Button type="submit" busy>
          Save
        </Button>
      </form>,
    );
    await user.click(screen.getByRole("button"));
    expect(onSubmit).not.toHaveBeenCalled();
  });

  test("lends its look to a link", () => {
    render(
      <Button asChild variant="main">
        <a href="/briefs/new">New brief</a>
      </Button>,
    );
    expect(screen.getByRole("link", { name: "New brief" }).getAttribute("href")).toBe("/briefs/new");
    expect(screen.queryByRole("button")).toBeNull();
  });
});

describe("Field", () => {
  test("ties label, hint and error to the control", () => {
    render(
      <Field label="Name" hint="As on the drawing" error="Give the brief a name" required>
        <TextInput />
      </Field>,
    );
    const input = screen.getByRole("textbox", { name: "Name" });
    const described = (input.getAttribute("aria-describedby") ?? "")
      .split(" ")
      .map((id) => document.getElementById(id)?.textContent);
    expect(described).toEqual(["Give the brief a name", "As on the drawing"]);
    expect(input.getAttribute("aria-invalid")).toBe("true");
    expect(input.hasAttribute("required")).toBe(true);
  });

  test("labels a text area and a list too", async () => {
    const user = userEvent.setup();
    const onValueChange = vi.fn();
    render(
      <>
        <Field label="Note">
          <TextArea />
        </Field>
        <Field label="Polarity" labelHidden>
          <Select
            value="n"
            onValueChange={onValueChange}
            options={[
              { value: "n", label: "N-channel" },
              { value: "p", label: "P-channel" },
            ]}
          />
        </Field>
      </>,
    );
    expect(screen.getByRole("textbox", { name: "Note" })).toBeTruthy();
    await user.selectOptions(screen.getByRole("combobox", { name: "Polarity" }), "P-channel");
    expect(onValueChange).toHaveBeenCalledExactlyOnceWith("p");
  });
});

test("a checkbox is ticked by its words", async () => {
  const user = userEvent.setup();
  render(<Checkbox label="Only parts in stock" hint="At the build quantity" />);
  await user.click(screen.getByText("Only parts in stock"));
  expect(screen.getByRole<HTMLInputElement>("checkbox", { name: "Only parts in stock" }).checked).toBe(true);
});

test("a choice of a few moves with the arrow keys", async () => {
  const user = userEvent.setup();
  const onChange = vi.fn();
  render(<RankBy onChange={onChange} />);
  expect(screen.getByRole("radiogroup", { name: "Rank by" })).toBeTruthy();
  await user.tab();
  expect(document.activeElement?.textContent).toBe("centring");
  // Held, as a finger does: the focus moves after the key goes down, and the choice follows it.
  await user.keyboard("{ArrowRight>}");
  await vi.waitFor(() => expect(onChange).toHaveBeenLastCalledWith("assured"));
  await user.keyboard("{/ArrowRight}");
  expect(screen.getByRole("radio", { name: "assured swing" }).getAttribute("aria-checked")).toBe("true");
});

test("a slider steps by keyboard and reads its value with the unit", async () => {
  const user = userEvent.setup();
  render(<Ambient />);
  const slider = screen.getByRole("slider", { name: "Ambient" });
  expect(slider.getAttribute("aria-valuetext")).toBe("25 °C");
  act(() => slider.focus());
  await user.keyboard("{ArrowRight}{ArrowRight}");
  expect(slider.getAttribute("aria-valuetext")).toBe("27 °C");
  await user.keyboard("{Home}");
  expect(slider.getAttribute("aria-valuetext")).toBe("-10 °C");
});

describe("Stepper", () => {
  test("names the neighbours on its buttons and asks for them", async () => {
    const user = userEvent.setup();
    const onStep = vi.fn();
    render(<Stepper label="R1" value="1M8" lower="1M6" higher="2M" onStep={onStep} />);
    await user.click(screen.getByRole("button", { name: "R1 lower, to 1M6" }));
    await user.click(screen.getByRole("button", { name: "R1 higher, to 2M" }));
    expect(onStep.mock.calls).toEqual([["lower"], ["higher"]]);
  });

  test("stops at the end of the series", () => {
    render(<Stepper label="RS" value="10R" lower={null} higher="11R" onStep={() => {}} />);
    expect(screen.getByRole<HTMLButtonElement>("button", { name: "RS has no lower value" }).disabled).toBe(
      true,
    );
  });
});

describe("what opens over the page", () => {
  test("a dialog takes the focus into its content, and Escape closes it", async () => {
    const user = userEvent.setup();
    const onOpenChange = vi.fn();
    render(
      <Dialog open onOpenChange={onOpenChange} title="New part" description="Only your team will see it.">
        <TextInput aria-label="Part number" />
      </Dialog>,
    );
    const dialog = screen.getByRole("dialog", { name: "New part" });
    expect(dialog.getAttribute("aria-describedby")).toBe(screen.getByText("Only your team will see it.").id);
    expect(document.activeElement).toBe(screen.getByRole("textbox"));
    await user.keyboard("{Escape}");
    expect(onOpenChange).toHaveBeenCalledExactlyOnceWith(false);
  });

  test("what opens adds no style element, which the content security policy would refuse", async () => {
    const user = userEvent.setup();
    const styles = () => document.querySelectorAll("style").length;
    const before = styles();
    render(
      <>
        <Menu trigger={<Button>More</Button>}>
          <MenuItem>Delete</MenuItem>
        </Menu>
        <Popover label="Why" trigger={<Button>Why?</Button>}>
          Because.
        </Popover>
        <Toaster />
      </>,
    );
    await user.click(screen.getByRole("button", { name: "More" }));
    await user.keyboard("{Escape}");
    await user.click(screen.getByRole("button", { name: "Why?" }));
    expect(screen.getByRole("dialog", { name: "Why" })).toBeTruthy();
    act(() => showUndoToast("Brief deleted.", () => {}));
    await user.click(screen.getByRole("button", { name: "Dismiss" }));
    render(<Dialog open onOpenChange={() => {}} title="New part" />);
    expect(styles()).toBe(before);
  });

  test("a question before the deed starts on the way out", async () => {
    const user = userEvent.setup();
    const onConfirm = vi.fn();
    render(
      <ConfirmDialog
        open
        onOpenChange={() => {}}
        title="Delete this brief?"
        description="Its 3 versions go with it."
        confirmLabel="Delete the brief"
        onConfirm={onConfirm}
      />,
    );
    expect(document.activeElement?.textContent).toBe("Keep it");
    await user.click(screen.getByRole("button", { name: "Delete the brief" }));
    expect(onConfirm).toHaveBeenCalledOnce();
  });

  test("a menu opens by keyboard and Enter takes the item", async () => {
    const user = userEvent.setup();
    const onSelect = vi.fn();
    render(
      <Menu trigger={<Button>More</Button>}>
        <MenuItem>Approve</MenuItem>
        <MenuItem onSelect={onSelect}>Bar</MenuItem>
      </Menu>,
    );
    await user.tab();
    await user.keyboard("{Enter}{ArrowDown}{Enter}");
    expect(onSelect).toHaveBeenCalledOnce();
    expect(screen.queryByRole("menu")).toBeNull();
  });

  test("a tooltip appears on focus and describes its button", async () => {
    const user = userEvent.setup();
    render(
      <Tooltip content="The room to the nearer limit">
        <Button>symmetric swing</Button>
      </Tooltip>,
    );
    await user.tab();
    const tip = await screen.findByRole("tooltip");
    expect(tip.textContent).toContain("The room to the nearer limit");
    expect(screen.getByRole("button").getAttribute("aria-describedby")).toBe(tip.id);
  });

  test("a notice offers undo and goes once it is taken", async () => {
    const user = userEvent.setup();
    const onUndo = vi.fn();
    render(<Toaster />);
    act(() => showUndoToast("Stage deleted.", onUndo));
    await user.click(screen.getByRole("button", { name: "Undo" }));
    expect(onUndo).toHaveBeenCalledOnce();
    expect(screen.queryByRole("button", { name: "Undo" })).toBeNull();
  });
});

describe("Value", () => {
  test.each([
    [4700, "Ω", "4.7 kΩ"],
    [1.8932e-3, "A", "1.89 mA"],
    [0.009, "%", "0.9 %"],
    [null, "V", "—"],
  ] as const)("writes %s in %s as %s", (number, unit, text) => {
    const { container } = render(<Value number={number} unit={unit} />);
    expect(container.textContent).toBe(text);
  });

  test("writes resistances as they are marked where the reader prefers that", () => {
    const { container } = render(
      <ResistanceStyleProvider value="rkm">
        <Value number={4700} unit="Ω" /> <Value number={4700} unit="Hz" />
      </ResistanceStyleProvider>,
    );
    expect(container.textContent).toBe("4k7 4.70 kHz");
  });
});

test("a problem says what happened, quotes its request and can be tried again", async () => {
  const user = userEvent.setup();
  const onRetry = vi.fn();
  const problem = {
    title: "The brief was not saved",
    detail: "Somebody else changed it.",
    requestId: "req-17",
    errors: [{ path: "rail.volts", message: "Rails go from 0.5 V to 450 V" }],
  };
  render(<ProblemMessage problem={problem} onRetry={onRetry} />);
  const alert = screen.getByRole("alert");
  for (const words of [problem.title, problem.detail, "req-17", problem.errors[0].message]) {
    expect(alert.textContent).toContain(words);
  }
  await user.click(screen.getByRole("button", { name: "Try again" }));
  expect(onRetry).toHaveBeenCalledOnce();
});

test("progress says how far it is, or that the end isn't known", () => {
  const { rerender } = render(<Progress fraction={0.42} label="842 of 2,000 parts searched" />);
  const bar = screen.getByRole("progressbar", { name: "842 of 2,000 parts searched" });
  expect(bar.getAttribute("aria-valuenow")).toBe("42");
  rerender(<Progress fraction={null} label="Waiting" />);
  expect(screen.getByRole("progressbar").hasAttribute("aria-valuenow")).toBe(false);
});
