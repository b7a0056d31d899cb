import { describe, expect, it } from "vitest";
import { judge } from "../../shared-core/judgement/judge.ts";
import { understand } from "../../shared-core/model/understand.ts";
import { answerFiles } from "../../shared-core/writing/answer-files.ts";

const TEXT = `thrum 1
title "A <pump> & its feet"
let drive_speed = 240 rpm
mass unit = 100 kg
spring feet between unit and ground = 40 N/mm
    loss_factor = 0.05
force shake on unit
    unbalance = 0.02 kg*m
    speed = drive_speed
ask sweep drawing
    of = unit.displacement
    by = shake
    from = 1 Hz
    to = 10 Hz
case fast
    drive_speed = 480 rpm
expect low = natural_frequency(1) <= 4 Hz
`;

const files = new Map(
  answerFiles(
    judge(understand("pump.thrum", TEXT, { read: () => ({ ok: false, why: "missing", detail: "" }) })),
    {
      asks: ["modes", "drawing"],
      as: "svg",
      units: "as-written",
    },
  ).map(({ name, text }) => [name, text]),
);

describe("pictures of a model", () => {
  it("are the drawing, the ruler and one an ask, in every case; an ask keeps its name", () => {
    const each = ["drawing_", "ruler", "modes", "drawing"];
    expect([...files.keys()]).toEqual([
      ...each.map((name) => `${name}.svg`),
      ...each.map((name) => `${name}.fast.svg`),
    ]);
  });

  it("stand alone and hold what they show", () => {
    for (const [name, svg] of files) {
      expect(svg, name).toMatch(/^<svg xmlns="http:\/\/www\.w3\.org\/2000\/svg"[\s\S]*<\/svg>\n$/);
      expect(svg, name).not.toMatch(/NaN|undefined|Infinity|<script|<style|href/);
    }
    expect(files.get("drawing_.svg")).toContain("A &lt;pump&gt; &amp; its feet");
    expect(files.get("drawing_.svg")).toMatch(
      /data-name="feet"><title>spring feet, 40 N\/mm, η 0\.05, between unit and ground/,
    );
    expect(files.get("ruler.svg")).toContain("1 · 3.183 Hz");
    expect(files.get("ruler.svg")).toContain("<title>shake, 4 Hz</title>");
    expect(files.get("ruler.fast.svg")).toContain("<title>shake, 8 Hz</title>");
  });
});
