/** Files to hand over, read back. */
import { beforeAll, describe, expect, it } from "vitest";
import { answersJson } from "../../src/report/answersJson.ts";
import { base64 } from "../../src/report/base64.ts";
import { curvesCsv, nodesCsv, trianglesCsv } from "../../src/report/csv.ts";
import { denseArray, symmetricMatrix } from "../../src/report/matrixMarket.ts";
import { summaryText } from "../../src/report/summary.ts";
import { pvdSeries, vtuSnapshot } from "../../src/report/vtk.ts";
import type { CaseResult } from "../../src/run/result.ts";
import { cylinder, simpleCase, solved } from "../helpers/solve.ts";

let result: CaseResult;
beforeAll(async () => {
  const document = simpleCase({
    outline: cylinder(0.03, 0.05),
    start: 500,
    ambient: 20,
    lasts: 1500,
    sides: { "*": { film: 100 } },
    probes: [{ name: "=SUM(1,2)", at: [0, 0.02] }],
    questions: [
      { ask: "when", where: "every-point", reaches: 60 },
      { ask: "spread" },
      { ask: "heat" },
      { ask: "when", where: "mean", reaches: 10 },
    ],
  });
  document.title = "A <rod>\nwith & odd \u001b[31m title";
  result = await solved(document, { nodes: 300, at: [100] });
});

/** Rows of a CSV file whose fields hold no comma outside quotes. */
const rows = (text: string): string[][] =>
  text
    .trimEnd()
    .split("\n")
    .map((line) =>
      [...line.matchAll(/("(?:[^"]|"")*"|[^,]*)(?:,|$)/g)].slice(0, -1).map((match) => match[1]!),
    );

/** One data array of a .vtu file, decoded after the published layout: 64-bit byte count, then the values. */
function dataArray(xml: string, name: string): { type: string; values: number[] } {
  const found = new RegExp(
    `<DataArray type="(\\w+)" Name="${name}"[^>]*format="binary">([^<]*)</DataArray>`,
  ).exec(xml)!;
  const bytes = new Uint8Array(Buffer.from(found[2]!, "base64"));
  expect(new DataView(bytes.buffer).getBigUint64(0, true)).toBe(BigInt(bytes.length - 8));
  const body = bytes.slice(8).buffer;
  const readers: Record<string, new (buffer: ArrayBuffer) => ArrayLike<number>> = {
    Float64: Float64Array,
    Float32: Float32Array,
    Int32: Int32Array,
    UInt16: Uint16Array,
    UInt8: Uint8Array,
  };
  return { type: found[1]!, values: Array.from(new readers[found[1]!]!(body)) };
}

describe("base64", () => {
  it("agrees with Node's own encoder at every length", () => {
    for (let length = 0; length < 20; length++) {
      const bytes = Uint8Array.from({ length }, (_, i) => (i * 97 + 13) % 256);
      expect(base64(bytes)).toBe(Buffer.from(bytes).toString("base64"));
    }
  });
});

describe("field snapshots", () => {
  it("hold every node, triangle and temperature of the frame", () => {
    const frame = result.frames.times.indexOf(100);
    expect(frame).toBeGreaterThan(0);
    const xml = vtuSnapshot(result, frame);
    const count = result.section.nodes.length / 2;
    const cells = result.section.triangleRegion.length;
    expect(xml).toContain(`NumberOfPoints="${count}" NumberOfCells="${cells}"`);
    const points = dataArray(xml, "Points").values;
    expect(points.length).toBe(3 * count);
    expect(points.filter((_, i) => i % 3 !== 2)).toEqual(Array.from(result.section.nodes));
    expect(points.filter((_, i) => i % 3 === 2).every((value) => value === 0)).toBe(true);
    expect(dataArray(xml, "connectivity").values).toEqual(Array.from(result.section.triangles));
    expect(dataArray(xml, "offsets").values.at(-1)).toBe(3 * cells);
    expect(new Set(dataArray(xml, "types").values)).toEqual(new Set([5]));
    expect(dataArray(xml, "temperature").values).toEqual(Array.from(result.frames.temperatures[frame]!));
    expect(dataArray(xml, "TimeValue").values).toEqual([100]);
  });

  it("are named with their times by the series, markup escaped", () => {
    const text = pvdSeries([
      { file: 'a<&".vtu', time: 0 },
      { file: "b.vtu", time: 2.5 },
    ]);
    expect([...text.matchAll(/timestep="([^"]*)"/g)].map((match) => Number(match[1]))).toEqual([0, 2.5]);
    expect(text).toContain('file="a&lt;&amp;&quot;.vtu"');
  });
});

describe("CSV", () => {
  it("curves have one line per instant, with units in the header and no formula for a spreadsheet to run", () => {
    const [header, ...lines] = rows(curvesCsv(result));
    expect(header!.slice(0, 3)).toEqual(["time_s", "core_degC", "coldest_degC"]);
    expect(header).toContain('"probe =SUM(1,2)_degC"');
    expect(lines.length).toBe(result.history.time.length);
    expect(lines.map((line) => Number(line[0]))).toEqual(Array.from(result.history.time));
    expect(lines.map((line) => Number(line[4]))).toEqual(Array.from(result.history.mean));
    expect(lines.every((line) => line.length === header!.length)).toBe(true);
  });

  it("nodes and triangles carry the field for stress work", () => {
    const nodes = rows(nodesCsv(result, [0, 3])).slice(1);
    expect(nodes.length).toBe(result.section.nodes.length / 2);
    expect(nodes.map((line) => Number(line[4]))).toEqual(Array.from(result.frames.temperatures[3]!, Number));
    const triangles = rows(trianglesCsv(result)).slice(1);
    expect(triangles.flatMap((line) => line.slice(1, 4).map(Number))).toEqual(
      Array.from(result.section.triangles),
    );
  });
});

describe("answers.json", () => {
  it("is plain JSON with the keys of the contract", () => {
    const json = JSON.parse(JSON.stringify(answersJson(result)));
    expect(Object.keys(json)).toEqual([
      "corelag",
      "title",
      "mesh",
      "run",
      "stages",
      "history",
      "estimates",
      "answers",
      "warnings",
    ]);
    expect(Object.keys(json.mesh)).toEqual(
      expect.arrayContaining(["nodes", "triangles", "minAngleDeg", "volume", "exposedArea"]),
    );
    expect(Object.keys(json.run)).toEqual(
      expect.arrayContaining(["scheme", "steps", "linearIterations", "seconds", "energyImbalance"]),
    );
    expect(Object.keys(json.answers[0])).toEqual(
      expect.arrayContaining(["question", "value", "unit", "at", "numericalUncertainty", "lumped", "series"]),
    );
    expect(json.history.probes["=SUM(1,2)"].length).toBe(json.history.time.length);
    expect(json.history.time).toContain(100);
    expect(json.estimates.lumped.history.temperature.length).toBe(json.estimates.lumped.history.time.length);
    expect(json.estimates.series.shape).toBe("finite-cylinder");
    expect(json.answers[3].value).toBeNull();
  });
});

describe("Matrix Market", () => {
  const pattern = {
    size: 2,
    rowStart: Int32Array.of(0, 2, 4),
    columns: Int32Array.of(0, 1, 0, 1),
    diagonal: Int32Array.of(0, 3),
  };
  it("stores the lower triangle of a symmetric matrix, numbers from 1", () => {
    expect(symmetricMatrix(pattern, Float64Array.of(4, -1, -1, 5), "two")).toBe(
      "%%MatrixMarket matrix coordinate real symmetric\n% two\n2 2 3\n1 1 4\n2 1 -1\n2 2 5\n",
    );
  });
  it("stores arrays by columns", () => {
    expect(
      denseArray(
        [
          [1, 2],
          [3, 4],
        ],
        "four",
      ),
    ).toBe("%%MatrixMarket matrix array real general\n% four\n2 2\n1\n2\n3\n4\n");
  });
});

describe("summary", () => {
  it("tells each answer, what the estimates say, what no answer was found for, and no control characters", () => {
    const text = summaryText(result);
    expect(text).toContain("When has every point reached");
    expect(text).toMatch(/one temperature: .*(early|late|agrees)/);
    expect(text).toContain("It does not get there within the stages given");
    // eslint-disable-next-line no-control-regex
    expect(text).not.toMatch(/[\u0000-\u0009\u000b-\u001f]/);
  });
});
