import { describe, expect, it } from "vitest";
import { safeDestination, signInRefusal } from "./refusal";

describe("safeDestination", () => {
  it("keeps a path of this server with its query", () => {
    expect(safeDestination("/studies/a1/rates?run=R04")).toBe("/studies/a1/rates?run=R04");
  });

  it.each([
    "//elsewhere.example/studies",
    "/\\elsewhere.example",
    "/\t/elsewhere.example",
    "https://elsewhere.example/",
    "javascript:alert(1)",
    "studies",
    "",
    undefined,
    ["/studies/a", "/studies/b"],
  ])("leads to the list of studies instead of %j", (wanted) => {
    expect(safeDestination(wanted)).toBe("/studies");
  });

  it("does not lead back to the sign-in page or to an address that answers data", () => {
    expect(safeDestination("/sign-in?to=/sign-in")).toBe("/studies");
    expect(safeDestination("/api/v1/studies")).toBe("/studies");
  });
});

describe("signInRefusal", () => {
  it("does not tell an unknown address from a wrong password", () => {
    expect(signInRefusal("CredentialsSignin")).toMatch(/do not belong together/);
  });

  it("says how long to wait, rounded up to minutes", () => {
    expect(signInRefusal("throttled:61")).toMatch(/Wait 2 minutes/);
    expect(signInRefusal("throttled:30")).toMatch(/Wait 1 minute,/);
  });

  it("never shows a code it does not know", () => {
    expect(signInRefusal("<b>SQLITE_ERROR</b>")).toBe(
      "The server could not check this now. Try again in a moment.",
    );
  });
});
