import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import type { Scene, SceneBox } from "../../shared-core/drawing/scene.ts";
import { MOST_DRAWN, systemScene } from "../../shared-core/drawing/system-scene.ts";
import { instantiate } from "../../shared-core/model/instantiate.ts";
import { STATEMENTS } from "../../shared-core/vocabulary/registry.ts";
import { EVERY_KIND, modelOf, randomModel } from "./models.ts";

const EXAMPLES = readdirSync("examples").filter((name) => name.endsWith(".thrum"));
const TEXTS = new Map<string, string>([
  ...EXAMPLES.map((name): [string, string] => [name, readFileSync(`examples/${name}`, "utf8")]),
  ["every kind", EVERY_KIND],
  ...Array.from({ length: 200 }, (_, seed): [string, string] => [`random ${seed}`, randomModel(seed)]),
]);

function sceneOf(text: string): Scene {
  const model = modelOf(text);
  return systemScene(model, model.buildable ? instantiate(model, 0).assembly : undefined, () => undefined);
}

const SCENES = new Map([...TEXTS].map(([name, text]) => [name, sceneOf(text)]));

/** Pairs of boxes that cover each other, by name; what belongs to one item may stand inside it. */
function overlaps({ items }: Scene): string[] {
  const boxes = items.flatMap((item, owner) => [
    { name: item.name, owner, box: item.box, isLabel: false },
    ...item.labels.map(({ text, box }) => ({ name: `"${text}"`, owner, box, isLabel: true })),
  ]);
  const found: string[] = [];
  for (let i = 0; i < boxes.length; i++) {
    for (let j = i + 1; j < boxes.length; j++) {
      const [a, b] = [boxes[i], boxes[j]];
      const isInside = a.owner === b.owner && !(a.isLabel && b.isLabel);
      if (!isInside && cover(a.box, b.box)) found.push(`${a.name} on ${b.name}`);
    }
  }
  return found;
}

/** A hair of touching is none. */
const HAIR = 0.25;
function cover(a: SceneBox, b: SceneBox): boolean {
  const along = Math.min(a.x + a.width, b.x + b.width) - Math.max(a.x, b.x);
  const up = Math.min(a.y + a.height, b.y + b.height) - Math.max(a.y, b.y);
  return along > HAIR && up > HAIR;
}

describe("a drawing", () => {
  it("lets nothing cover anything else, on examples and 200 random models", () => {
    for (const [name, scene] of SCENES) {
      expect(scene.items.length, name).toBeGreaterThan(5);
      expect(overlaps(scene), name).toEqual([]);
    }
  });

  it("stays on its paper, with finite paths", () => {
    for (const [name, scene] of SCENES) {
      for (const { box, labels, parts } of scene.items) {
        for (const each of [box, ...labels.map((label) => label.box)]) {
          expect(each.x, name).toBeGreaterThanOrEqual(0);
          expect(each.y, name).toBeGreaterThanOrEqual(0);
          expect(each.x + each.width, name).toBeLessThanOrEqual(scene.width);
          expect(each.y + each.height, name).toBeLessThanOrEqual(scene.height);
        }
        for (const { path } of parts) expect(path, name).toMatch(/^M[-\d.,MLHVCSQAZamlhvz ]+$/);
      }
    }
  });

  it("has an item for every mass, inertia, spring, damper and drive of a text", () => {
    for (const [name, text] of TEXTS) {
      const drawn = new Set(SCENES.get(name)?.items.map((item) => item.name));
      const wanted = [...text.matchAll(/^(?:mass|inertia|junction|spring|damper|force|torque) (\w+)/gm)];
      for (const [, statement] of wanted) expect(drawn.has(statement), `${name}: ${statement}`).toBe(true);
    }
  });

  it("keeps room for its words", () => {
    // The narrowest room that four digits and a unit of an average sans-serif face need: 0.52 em a letter.
    for (const [name, scene] of SCENES) {
      for (const { text, role, box } of scene.items.flatMap(({ labels }) => labels)) {
        const size = role === "name" ? 12 : 11;
        expect(0.52 * size * [...text].length, `${name}: ${text}`).toBeLessThanOrEqual(box.width);
      }
    }
  });

  it("writes what stands in a body inside it", () => {
    let count = 0;
    for (const [name, { items }] of SCENES) {
      for (const { box, labels } of items.filter(({ keyword }) => keyword === "body" || keyword === "mass")) {
        for (const { text, box: room } of labels) {
          expect(room.x, `${name}: ${text}`).toBeGreaterThanOrEqual(box.x);
          expect(room.x + room.width, `${name}: ${text}`).toBeLessThanOrEqual(box.x + box.width);
          count++;
        }
      }
    }
    expect(count).toBeGreaterThan(1000);
  });

  it("is the same every time", () => {
    for (const text of [EVERY_KIND, randomModel(7), randomModel(42)]) {
      expect(sceneOf(text)).toEqual(sceneOf(text));
    }
  });

  it("moves nothing when numbers change", () => {
    for (const [name, text] of [...TEXTS].slice(0, 60)) {
      const [head, ...rest] = text.split("\n");
      // A number of another length, behind `=` only: names and joints stay.
      const edited = [head, ...rest.map((line) => line.replace(/= \d[\d.]*(?:e-?\d+)?/, "= 9.7531"))].join(
        "\n",
      );
      expect(edited, name).not.toBe(text);
      expect(placesIn(sceneOf(edited)), name).toEqual(placesIn(SCENES.get(name) as Scene));
    }
  });
});

const placesIn = ({ width, height, items }: Scene) => ({
  width,
  height,
  items: items.map(({ name, box, parts, labels }) => ({
    name,
    box,
    parts: parts.map(({ path }) => path),
    labels: labels.map(({ x, y, box: room }) => ({ x, y, room })),
  })),
});

describe("kinds of statements", () => {
  it("are all drawn that move, join or drive", () => {
    const drawn = new Set(sceneOf(EVERY_KIND).items.map(({ keyword }) => keyword));
    const seen = STATEMENTS.filter(({ family }) => ["moves", "joins", "drives"].includes(family));
    for (const { keyword } of seen) if (keyword !== "group") expect(drawn, keyword).toContain(keyword);
  });

  it("look otherwise where they turn, through junctions too", () => {
    const scene = sceneOf(`thrum 1
inertia rotor = 3 kg*m^2
mass drum = 8 kg
junction knee
junction far
spring shaft between rotor and knee = 5 N*m/rad
damper oil between knee and far = 2 N*m*s/rad
spring stub between far and ground = 5 N*m/rad
spring feet between drum and ground = 5 N/mm
`);
    const bodies = (name: string) =>
      scene.items.find((item) => item.name === name)?.parts.filter(({ style }) => style === "body").length;
    // A shaft is a bar, a spring a line.
    expect(["shaft", "stub", "feet"].map(bodies)).toEqual([1, 1, 0]);
    const paths = (name: string) => scene.items.find((item) => item.name === name)?.parts.length;
    expect(paths("oil")).toBe(5);
  });

  it("name what they join", () => {
    const says = new Map(sceneOf(EVERY_KIND).items.map((item) => [item.name, item.says]));
    expect(says.get("feet")).toBe("spring feet, 4 × 26.5 N/mm, between unit and ground");
    expect(says.get("pipe")).toBe("spring pipe, 26.5 N/mm, η 0.03, between nozzle and unit");
    expect(says.get("blow")).toBe("force blow, 30 N, on arm");
    expect(says.get("quake")).toBe("motion quake, 3 mm, 2 Hz, of floor");
  });
});

describe("what moves", () => {
  const text = `thrum 1
mass unit = 420 kg
inertia rotor = 3 kg*m^2
spring feet between unit and ground = 26 N/mm
damper oil between unit and ground = 2 kN*s/m
spring shaft between rotor and ground = 3 kN*m/rad
`;
  const { items, coordinates } = sceneOf(text);
  const partsOf = (name: string) => items.find((item) => item.name === name)?.parts ?? [];

  it("goes up with a sliding coordinate and turns about its middle with a turning one", () => {
    expect(coordinates).toEqual(["unit", "rotor"]);
    const [unit] = partsOf("unit");
    expect(unit.rides).toMatchObject({
      on: "anchor",
      anchor: { sways: [{ coordinate: 0, dx: 0, dy: -1, turn: 0 }] },
    });
    const [rotor] = partsOf("rotor");
    expect(rotor.rides).toMatchObject({
      on: "anchor",
      anchor: { sways: [{ coordinate: 1, dx: 0, dy: 0, turn: 1 }] },
    });
  });

  it("stretches a spring between its ends and takes the parts of a damper apart", () => {
    for (const { rides } of partsOf("feet")) {
      expect(rides).toMatchObject({ on: "stretch", from: { sways: [{ coordinate: 0 }] }, to: { sways: [] } });
    }
    const anchors = partsOf("oil").map(({ rides }) =>
      rides.on === "anchor" ? rides.anchor.sways.length : -1,
    );
    expect(new Set(anchors)).toEqual(new Set([0, 1]));
  });
});

describe("a chain that would be too high", () => {
  const masses = Array.from({ length: MOST_DRAWN }, (_, i) => `mass m${i} = 1 kg`);
  const springs = masses.map(
    (_, i) => `spring k${i} between m${i} and ${i === 0 ? "ground" : `m${i - 1}`} = 1 N/m`,
  );
  const scene = sceneOf(`thrum 1\n${[...masses, ...springs].join("\n")}\n`);

  it("is folded, and what stands twice sways twice", () => {
    expect(scene.height).toBeLessThan(1400);
    expect(overlaps(scene)).toEqual([]);
    expect(scene.items.filter(({ keyword }) => keyword === "spring")).toHaveLength(MOST_DRAWN);
    const drawn = scene.items.filter(({ keyword }) => keyword === "mass");
    const twice = drawn.filter(({ name }, i) => drawn.findIndex((other) => other.name === name) !== i);
    expect(twice.length).toBeGreaterThan(0);
    expect(drawn).toHaveLength(MOST_DRAWN + twice.length);
    for (const { name, parts } of drawn) {
      const coordinate = Number(name.slice(1));
      expect(parts[0].rides).toMatchObject({ on: "anchor", anchor: { sways: [{ coordinate }] } });
    }
  });
});

describe("what is hard to draw", () => {
  it("becomes a chart when there are too many coordinates", () => {
    const masses = Array.from(
      { length: MOST_DRAWN + 1 },
      (_, i) => `mass m${i} = 1 kg\nspring k${i} between m${i} and ground = 1 N/m`,
    );
    const scene = sceneOf(`thrum 1\n${masses.join("\n")}\n`);
    expect(scene).toMatchObject({ kind: "chart", items: [] });
    expect(scene.coordinates).toHaveLength(MOST_DRAWN + 1);
  });

  it("is drawn as far as it can be read", () => {
    const broken = [
      "",
      "thrum 1\n",
      "mass\nspring between and\n",
      "mass a = 1 kg\nmass a = 2 kg\nspring k between a and nowhere = 3 N/m\n",
      "spring k between k and k = 1 N/m\nmass k = 2 kg\n",
      "mass a = 1 kg\nspring k between a and a = 1 N/m\nbind a = 2 * a\n",
      "pendulum p = 3 kg\n    on = p\nbody b = 1 kg\npoint q on q at (0, 0, 0) m\n",
      "support s\nmotion m of s\nmotion n of ground\nforce f on ground\nsupport t\nspring k between s and t = 1 N/m\n",
      "mass a = 1 kg\nmotion m of a\n",
      "mass <b> = 1 kg\n",
    ];
    for (const text of broken) {
      const scene = sceneOf(text);
      expect(Number.isFinite(scene.width + scene.height), text).toBe(true);
      expect(overlaps(scene), text).toEqual([]);
    }
  });
});
