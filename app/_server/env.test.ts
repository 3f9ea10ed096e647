import { describe, expect, it } from "vitest";
import { readEnvironment } from "./env";

describe("readEnvironment", () => {
  it("answers this machine only, on port 3000, where nothing is set", () => {
    expect(readEnvironment({})).toMatchObject({
      publicOrigin: null,
      isLoopback: true,
      port: 3000,
      authSecret: null,
    });
  });

  it("takes an empty variable for an unset one", () => {
    expect(readEnvironment({ PUBLIC_URL: "", PORT: "" })).toMatchObject({ publicOrigin: null, port: 3000 });
  });

  it("keeps only the origin of the public address", () => {
    const environment = readEnvironment({ PUBLIC_URL: "https://kinetics.example:8443/bench/" });
    expect(environment).toMatchObject({ publicOrigin: "https://kinetics.example:8443", isLoopback: false });
  });

  it("knows a public address that is this machine all the same", () => {
    for (const PUBLIC_URL of ["http://localhost:3000", "http://127.0.0.1", "http://[::1]:80"]) {
      expect(readEnvironment({ PUBLIC_URL }).isLoopback).toBe(true);
    }
  });

  it("listens beyond this machine only where the demo is refused", () => {
    expect(readEnvironment({}).host).toBe("127.0.0.1");
    expect(readEnvironment({ PUBLIC_URL: "http://localhost:3000" }).host).toBe("127.0.0.1");
    expect(readEnvironment({ PUBLIC_URL: "https://kinetics.example" })).toMatchObject({
      isLoopback: false,
      host: "0.0.0.0",
    });
  });

  it.each([
    ["PUBLIC_URL", "kinetics.example"],
    ["PUBLIC_URL", "ftp://kinetics.example"],
    ["PORT", "http"],
    ["PORT", "70000"],
    ["AUTH_SECRET", "short"],
    ["DEMO_PASSWORD", "short"],
  ])("names %s where it is %j", (name, value) => {
    expect(() => readEnvironment({ [name]: value })).toThrow(name);
  });
});
