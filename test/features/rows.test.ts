import { describe, expect, it } from "vitest";
import { rowsToStatements } from "../../shared-core/features/rows.ts";
import { errorsOf, viewOf } from "./views.ts";

const MODEL = "mass Unit = 3 kg\nmass slab = 4 kg\n";

function taken(rows: readonly (readonly string[])[], ending = "\n"): string {
  const result = rowsToStatements(viewOf(MODEL), rows.map((row) => row.join("\t")).join(ending));
  return "text" in result ? result.text : `refused: ${result.refused}`;
}

describe("rows of a table as statements", () => {
  it("makes masses, with sources, remarks and tolerances", () => {
    expect(
      taken([
        ["Item", "mass (kg)", "Tolerance (%)", "Source", "Remarks"],
        ["Pump no. 3", "310", "3", "ticket  0417", ""],
        ["Motor", "185,5", "", "", "with guard"],
        ["2nd fan", "1.2e3", "± 5", "", ""],
      ]),
    ).toBe(
      "> source: ticket 0417\nmass pump_no_3 = 310 kg +/- 3 %\n> with guard\nmass motor = 185.5 kg\nmass n_2nd_fan = 1.2e3 kg +/- 5 %\n",
    );
  });

  it("makes springs and dampers between the ends that two columns name", () => {
    const text = taken(
      [
        ["name", "from", "to", "k [N/mm]", "c / N·s/m", "count", "loss factor"],
        ["mount", "unit", "Slab", "26.5", "", "4", "0.08"],
        ["beam", "slab", "ground", "11000", "300", "", ""],
      ],
      "\r\n",
    );
    expect(text).toBe(`spring mount between Unit and slab = 26.5 N/mm
    count = 4
    loss_factor = 0.08
spring beam between slab and ground = 11000 N/mm
damper beam_c between slab and ground = 300 N*s/m
`);
    expect(errorsOf(`thrum 1\n${MODEL}${text}`)).toEqual([]);
  });

  it("makes numbers of everything else, units from header or cell", () => {
    expect(
      taken([
        ["name", "k [N/mm]"],
        ["foot", "62"],
      ]),
    ).toBe("let foot = 62 N/mm\n");
    expect(
      taken([
        ["name", "speed in rpm"],
        ["pump", "1180"],
      ]),
    ).toBe("let pump = 1180 rpm\n");
    expect(
      taken([
        ["name", "value"],
        ["gap", "3 mm"],
        ["speed", "12 Hz"],
      ]),
    ).toBe("let gap = 3 mm\nlet speed = 12 Hz\n");
    expect(
      taken([
        ["name", "I (mm⁴)", "E, GPa"],
        ["beam", "2400", "210"],
      ]),
    ).toBe("let beam_i = 2400 mm^4\nlet beam_e = 210 GPa\n");
    expect(
      taken([
        ["k (Nm/rad)", "note"],
        ["62", "left"],
      ]),
    ).toBe("> left\nlet torque_1 = 62 N*m/rad\n");
    expect(
      taken([
        ["name", "J (kg m²)"],
        ["rotor", "3"],
      ]),
    ).toBe("inertia rotor = 3 kg*m^2\n");
  });

  it("keeps clear of names that are taken, of units and of words of the language", () => {
    expect(
      taken([
        ["name", "m (kg)"],
        ["Slab", "1"],
        ["slab", "2"],
        ["kg", "3"],
        ["ground", "4"],
      ]),
    ).toBe("mass slab_2 = 1 kg\nmass slab_3 = 2 kg\nmass kg_2 = 3 kg\nmass ground_2 = 4 kg\n");
  });

  it.each<[string, readonly (readonly string[])[], string]>([
    [
      "one column",
      [["mass (kg)"], ["3"]],
      "the columns of a table are parted by tabs, and there is one column only",
    ],
    [
      "no header",
      [
        ["pump", "3"],
        ["fan", "4"],
      ],
      "the first row is no header; it names the columns with their units, as `mass (kg)`",
    ],
    ["no rows", [["name", "mass (kg)"]], "there is a header and no row below it"],
    [
      "no unit",
      [
        ["name", "k"],
        ["foot", "62"],
      ],
      "the column `k` has no unit; the header names it, as `k (N/mm)`",
    ],
    [
      "no such unit",
      [
        ["name", "k (N/furlong)"],
        ["foot", "62"],
      ],
      "`N/furlong` in the header is no unit",
    ],
    [
      "two meanings",
      [
        ["name", "m (lb)"],
        ["pump", "62"],
      ],
      "`lb` in the header is no unit; lbm or lbf?",
    ],
    [
      "a number that may be two",
      [
        ["name", "m (kg)"],
        ["pump", "1,250"],
      ],
      "row 2: `1,250` may be 1.250 or 1250",
    ],
    [
      "no number",
      [
        ["name", "m (kg)"],
        ["pump", "3"],
        ["fan", "about 3"],
      ],
      "row 3: `about 3` is no number",
    ],
    [
      "no numbers at all",
      [
        ["name", "colour"],
        ["pump", "red"],
      ],
      "the column `colour` holds no numbers, and its title says nothing known",
    ],
    [
      "a missing end",
      [
        ["name", "from", "to", "k (N/m)"],
        ["s", "unit", "", "3"],
      ],
      "row 2: an end is missing",
    ],
    [
      "a tolerance of nothing",
      [
        ["name", "m (kg)", "tol"],
        ["a", "3", "2"],
      ],
      "row 2: the tolerance `2` has no unit; `%` or that of the value",
    ],
  ])("refuses %s", (_, rows, reason) => {
    expect(taken(rows)).toBe(`refused: ${reason}`);
  });

  it("reads thousands both ways, and leaves out rows without a value", () => {
    expect(
      taken([
        ["name", "m (kg)"],
        ["a", "1,234.5"],
        ["b", "1.234,5"],
        ["c", ""],
        ["d", "−3"],
      ]),
    ).toBe("mass a = 1234.5 kg\nmass b = 1234.5 kg\nmass d = -3 kg\n");
  });

  it("never throws", () => {
    for (const text of ["", "\t", "\t\n\t\n", "a\tb\n\u0000\t𐐀", "x\ty\n1\t2\t3\t4\n"]) {
      expect(Object.keys(rowsToStatements(viewOf(""), text))).toEqual(["refused"]);
    }
  });
});
