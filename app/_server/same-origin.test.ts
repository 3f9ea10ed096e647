import { describe, expect, it } from "vitest";
import { isSameOrigin } from "./same-origin";

const ask = (headers: Record<string, string>, publicOrigin: string | null) =>
  isSameOrigin(new Headers(headers), publicOrigin);

describe("a server with a public address", () => {
  const ours = "https://kinetics.example";

  it.each<Record<string, string>>([
    { origin: ours },
    { "sec-fetch-site": "same-origin" },
    {
      origin: ours,
      "sec-fetch-site": "same-origin",
      host: "10.0.0.4:3000",
      "x-forwarded-host": "elsewhere.example",
    },
  ])("accepts %j", (headers) => {
    expect(ask(headers, ours)).toBe(true);
  });

  it.each<Record<string, string>>([
    {},
    { host: "kinetics.example" },
    { origin: "http://kinetics.example" },
    { origin: "https://kinetics.example.elsewhere.example" },
    {
      origin: "https://elsewhere.example",
      host: "elsewhere.example",
      "x-forwarded-host": "elsewhere.example",
    },
    { origin: "https://elsewhere.example", "sec-fetch-site": "same-origin" },
    { origin: ours, "sec-fetch-site": "cross-site" },
    { "sec-fetch-site": "none" },
    { origin: "null" },
  ])("refuses %j", (headers) => {
    expect(ask(headers, ours)).toBe(false);
  });
});

describe("a server for this machine only", () => {
  it.each<Record<string, string>>([
    { host: "localhost:3000", origin: "http://localhost:3000" },
    { host: "127.0.0.1:3000", origin: "http://localhost:3000" },
    { host: "[::1]:3000", origin: "http://[::1]:3000" },
    { host: "localhost", origin: "http://localhost" },
    { host: "localhost:3000", "sec-fetch-site": "same-origin" },
  ])("accepts %j", (headers) => {
    expect(ask(headers, null)).toBe(true);
  });

  it.each<Record<string, string>>([
    { host: "localhost:3000" },
    { host: "localhost:3000", origin: "http://localhost:3001" },
    { host: "localhost:3000", origin: "http://localhost" },
    { host: "localhost:3000", origin: "https://localhost:3000" },
    { host: "localhost:3000", origin: "http://localhost:3000.elsewhere.example" },
    { host: "rebound.example:3000", origin: "http://rebound.example:3000", "sec-fetch-site": "same-origin" },
    { host: "rebound.example:3000", "sec-fetch-site": "same-origin" },
    { origin: "http://localhost:3000" },
  ])("refuses %j", (headers) => {
    expect(ask(headers, null)).toBe(false);
  });
});
