import { cleanup, render, screen } from "@testing-library/react";
import { userEvent } from "@testing-library/user-event";
import { useState } from "react";
import { afterEach, describe, expect, test, vi } from "vitest";
import { BlankInput, BlankSelect } from "../../../web/ui/blank-input";
import { Field } from "../../../web/ui/field";
import { QuantityInput } from "../../../web/ui/quantity-input";

afterEach(cleanup);

type ResistorProps = { onChange?: (ohms: number | null) => void; optional?: boolean; start?: number | null };

function Resistor({ onChange, optional, start = 4700 }: ResistorProps) {
  const [ohms, setOhms] = useState<number | null>(start);
  return (
    <Field label="Drain resistor" hint="In the series">
      <QuantityInput
        unit="Ω"
        value={ohms}
        optional={optional}
        onChange={(next) => {
          setOhms(next);
          onChange?.(next);
        }}
      />
    </Field>
  );
}

const box = () => screen.getByRole<HTMLInputElement>("textbox");

async function retype(user: ReturnType<typeof userEvent.setup>, text: string) {
  await user.clear(box());
  await user.type(box(), text);
}

describe("a quantity typed as text", () => {
  test("shows the value with its unit", () => {
    render(<Resistor />);
    expect(screen.getByLabelText<HTMLInputElement>("Drain resistor").value).toBe("4.7 kΩ");
  });

  test.each([
    ["2k2", 2200, "2.2 kΩ"],
    ["1.5 M", 1.5e6, "1.5 MΩ"],
    ["820", 820, "820 Ω"],
  ])("reads %s when the box is left and shows it in engineering notation", async (text, ohms, shown) => {
    const user = userEvent.setup();
    const onChange = vi.fn();
    render(<Resistor onChange={onChange} />);
    await retype(user, text);
    expect(onChange).not.toHaveBeenCalled();
    await user.tab();
    expect(onChange).toHaveBeenCalledExactlyOnceWith(ohms);
    expect(box().value).toBe(shown);
  });

  test("reads on Enter too", async () => {
    const user = userEvent.setup();
    const onChange = vi.fn();
    render(<Resistor onChange={onChange} />);
    await retype(user, "3k3{Enter}");
    expect(onChange).toHaveBeenCalledExactlyOnceWith(3300);
  });

  test("keeps what can't be read in sight, says why, and ties the words to the box", async () => {
    const user = userEvent.setup();
    const onChange = vi.fn();
    render(<Resistor onChange={onChange} />);
    await retype(user, "lots");
    await user.tab();
    expect(box().value).toBe("lots");
    expect(box().getAttribute("aria-invalid")).toBe("true");
    const alert = screen.getByRole("alert");
    expect(alert.textContent).toContain("“lots”");
    expect(box().getAttribute("aria-describedby")?.split(" ")).toContain(alert.id);
    expect(onChange).not.toHaveBeenCalled();
    await retype(user, "1k");
    await user.tab();
    expect(screen.queryByRole("alert")).toBeNull();
    expect(box().getAttribute("aria-invalid")).toBeNull();
  });

  test("Escape brings back the value that was there", async () => {
    const user = userEvent.setup();
    const onChange = vi.fn();
    render(<Resistor onChange={onChange} />);
    await retype(user, "9k{Escape}");
    expect(box().value).toBe("4.7 kΩ");
    await user.tab();
    expect(onChange).not.toHaveBeenCalled();
  });

  test("leaving the box untouched loses no digit", async () => {
    const user = userEvent.setup();
    const onChange = vi.fn();
    render(<Resistor onChange={onChange} start={4712.345} />);
    await user.click(box());
    await user.tab();
    expect(onChange).not.toHaveBeenCalled();
    expect(box().value).toBe("4.712345 kΩ");
  });

  test("an empty box is an answer only where it may be", async () => {
    const user = userEvent.setup();
    const onChange = vi.fn();
    const { unmount } = render(<Resistor onChange={onChange} />);
    await user.clear(box());
    await user.tab();
    expect(screen.getByRole("alert")).toBeTruthy();
    expect(onChange).not.toHaveBeenCalled();
    unmount();
    render(<Resistor onChange={onChange} optional />);
    await user.clear(box());
    await user.tab();
    expect(onChange).toHaveBeenCalledExactlyOnceWith(null);
  });

  test("arrow keys ask for the neighbouring value", async () => {
    const user = userEvent.setup();
    const onStep = vi.fn();
    render(<QuantityInput aria-label="R1" unit="Ω" value={1000} onChange={() => {}} onStep={onStep} />);
    await user.click(box());
    await user.keyboard("{ArrowUp}{ArrowDown}");
    expect(onStep.mock.calls).toEqual([["higher"], ["lower"]]);
  });
});

describe("a blank in a sentence", () => {
  test("has a name of its own and takes per cent as a fraction", async () => {
    const user = userEvent.setup();
    const onChange = vi.fn();
    render(<BlankInput label="Rail tolerance" unit="%" value={0.05} onChange={onChange} />);
    const blank = screen.getByRole<HTMLInputElement>("textbox", { name: "Rail tolerance" });
    expect(blank.value).toBe("5 %");
    await user.clear(blank);
    await user.type(blank, "10{Enter}");
    expect(onChange).toHaveBeenCalledExactlyOnceWith(0.1);
  });

  test("leaves the unit to the sentence where asked", () => {
    render(<BlankInput label="Lowest" unit="°C" unitHidden value={-10} onChange={() => {}} />);
    expect(box().value).toBe("\u221210");
  });

  test("hands its error to the sentence, which shows it, and is tied to it", async () => {
    const user = userEvent.setup();
    const onUnreadable = vi.fn();
    render(
      <>
        <BlankInput
          label="Rail"
          unit="V"
          value={12}
          onChange={() => {}}
          onUnreadable={onUnreadable}
          errorId="why"
        />
        <p id="why">Words under the sentence</p>
      </>,
    );
    await user.clear(box());
    await user.type(box(), "twelve{Enter}");
    expect(onUnreadable).toHaveBeenLastCalledWith(expect.stringContaining("“twelve”"));
    expect(box().getAttribute("aria-invalid")).toBe("true");
    expect(box().getAttribute("aria-describedby")).toBe("why");
  });

  test("grows with what stands in it", async () => {
    const user = userEvent.setup();
    render(<BlankInput label="Rail" unit="V" value={12} onChange={() => {}} />);
    const before = box().style.width;
    await user.type(box(), "000000");
    expect(before).toContain("4ch");
    expect(box().style.width).toContain("10ch");
  });

  test("a choice in a sentence is a labelled list", async () => {
    const user = userEvent.setup();
    const onChange = vi.fn();
    const options = [
      { value: "E12", label: "E12" },
      { value: "E24", label: "E24" },
    ] as const;
    render(<BlankSelect label="Series" options={options} value="E24" onChange={onChange} />);
    await user.selectOptions(screen.getByRole("combobox", { name: "Series" }), "E12");
    expect(onChange).toHaveBeenCalledExactlyOnceWith("E12");
  });
});
