import { convert } from "jcampconverter";
import { describe, expect, it } from "vitest";
import { readTable } from "../read-file";
import type { FileReading } from "../reading";
import { textTable } from "../table-text";
import { EMPTY_STUDY } from "../testing-context";
import { readOrdinates } from "./ordinates";

function readingOf(text: string) {
  return readTable(textTable(new TextEncoder().encode(text), {}), EMPTY_STUDY, {});
}

function read(text: string): FileReading {
  const reading = readingOf(text);
  if (reading.status !== "read") throw new Error(`refused: ${reading.message}`);
  return reading;
}

function refusal(text: string): string {
  const reading = readingOf(text);
  return reading.status === "refused" ? reading.message : "not refused";
}

const HEAD = `##TITLE=R1
##JCAMP-DX=4.24 $$ written for these tests
##DATA TYPE=KINETIC COURSE
##XUNITS=SECONDS
##YUNITS=ABSORBANCE
##XFACTOR=1
##YFACTOR=0.001
##FIRSTX=0
##LASTX=9
##NPOINTS=10
`;
const course = (data: string, head = HEAD) => `${head}##XYDATA=(X++(Y..Y))\n${data}\n##END=\n`;

describe("the five ways to write ordinates", () => {
  // The same ten numbers in each, after the example of the format's paper (Appl. Spectrosc. 42 (1988) 151), from memory.
  it.each([
    ["AFFN", "0 1 2 3 3 2 1 0 -1 -2 -3"],
    ["PAC", "0+1+2+3+3+2+1+0-1-2-3"],
    ["SQZ", "0ABCCBA@abc"],
    ["DIF", "0AJJ%jjjjjj"],
    ["DIFDUP", "0AJT%jX"],
  ])("%s", (_, line) => {
    const read = readOrdinates([line], 1, 100);
    expect(read.status === "read" && read.lines[0]?.ordinates).toEqual([1, 2, 3, 3, 2, 1, 0, -1, -2, -3]);
  });

  it("checks the ordinate that is said again after differences", () => {
    expect(readOrdinates(["0AJJ", "3CJ"], 5, 100)).toMatchObject({
      lines: [{ ordinates: [1, 2, 3] }, { ordinates: [4] }],
    });
    expect(readOrdinates(["0AJJ", "3DJ"], 5, 100)).toMatchObject({ status: "fault", line: 6 });
  });

  it("reads an exponent with its sign, and E before a digit as the squeezed 5", () => {
    const ordinates = (line: string) => {
      const read = readOrdinates([line], 1, 100);
      return read.status === "read" ? read.lines[0]?.ordinates : null;
    };
    expect(ordinates("0 1.5E-03 2E+1")).toEqual([0.0015, 20]);
    expect(ordinates("0E0E1")).toEqual([50, 51]);
  });

  it("is not made to write more than it may", () => {
    expect(readOrdinates(["0AS9999999999"], 1, 1000)).toMatchObject({ status: "fault" });
  });
});

describe("a JCAMP-DX file", () => {
  it("gives times and signals as its factors say", () => {
    const reading = read(course("0 10 20 30 41 52\n5 63 70 71 72 73"));
    expect(reading.container).toBe("jcamp-dx");
    expect(reading.traces.map(({ label }) => label)).toEqual(["R1"]);
    expect([...(reading.traces[0]?.timeSeconds ?? [])]).toEqual([0, 1, 2, 3, 4, 5, 6, 7, 8, 9]);
    expect([...(reading.traces[0]?.signal ?? [])]).toEqual([
      0.01, 0.02, 0.03, 0.041, 0.052, 0.063, 0.07, 0.071, 0.072, 0.073,
    ]);
  });

  it("agrees with an independent reader on a course in differences and repeats", () => {
    const text = course("0A0J0T%T\n4C0J1U%J0");
    const theirs = convert(text, { noContour: true }).flatten[0]?.spectra[0]?.data;
    expect([...(read(text).traces[0]?.signal ?? [])]).toEqual(
      theirs?.y?.map((y) => Number(y.toPrecision(12))),
    );
    expect([...(read(text).traces[0]?.signal ?? [])]).toEqual([
      0.01, 0.02, 0.03, 0.03, 0.03, 0.041, 0.052, 0.063, 0.063, 0.073,
    ]);
  });

  it("reads pairs, minutes and a reading that was not taken", () => {
    const head = HEAD.replace("SECONDS", "MINUTES").replace("##NPOINTS=10\n", "");
    const reading = read(`${head}##XYPOINTS=(XY..XY)\n0, 10; 0.5, ?\n1, 30\n2, 40\n##END=\n`);
    expect([...(reading.traces[0]?.timeSeconds ?? [])]).toEqual([0, 60, 120]);
    expect([...(reading.traces[0]?.signal ?? [])]).toEqual([0.01, 0.03, 0.04]);
  });

  it("reads linked blocks as runs that share their times", () => {
    const block = (title: string, data: string) =>
      course(
        data,
        HEAD.replace("##TITLE=R1", `##TITLE=${title}`)
          .replace("NPOINTS=10", "NPOINTS=3")
          .replace("LASTX=9", "LASTX=2"),
      );
    const reading = read(
      `##TITLE=All\n##DATA TYPE=LINK\n##BLOCKS=2\n${block("R1", "0 1 2 3")}${block("R2", "0 4 5 7")}##END=\n`,
    );
    expect(reading.layout.value).toBe("wide");
    expect(reading.traces.map(({ label, signal }) => [label, [...signal]])).toEqual([
      ["R1", [0.001, 0.002, 0.003]],
      ["R2", [0.004, 0.005, 0.007]],
    ]);
  });

  it("asks to check an ordinate that is no absorbance", () => {
    const reading = read(course("0 1 2 3 4 5 6 7 8 9 10", HEAD.replace("ABSORBANCE", "TRANSMITTANCE")));
    expect(reading.issues.find(({ code }) => code === "ordinate-unit")?.message).toContain("transmittance");
  });

  it.each([
    [
      "along another axis",
      course("0 1 2", HEAD.replace("SECONDS", "NANOMETERS")),
      /runs along nanometers, not along time/,
    ],
    ["with points missing", course("0 1 2 3"), /states 10 points \(line 10\) and holds 3/],
    ["with a line missing", course("0 1 2 3 4 5\n7 1 2 3 4 5"), /Line 13 .*begins at 7 where 5 is due/],
    ["with letters that mean nothing", course("0 1 2 #3"), /Line 12 .*is no line of numbers/],
    ["with a check that fails", course("0AJJJJ\n4FJJJJJ"), /Line 13 .*last ordinate before it was 5/],
    ["of a form not read", `${HEAD}##XYDATA=(XY..Z)\n0 1\n##END=`, /the form “\(XY\.\.Z\)”/],
    ["without data", `${HEAD}##END=`, /no XYDATA or XYPOINTS/],
  ])("%s is refused, naming the place", (_, text, message) => {
    expect(refusal(text)).toMatch(message);
  });
});
