import { randomInt } from "node:crypto";

/** Four groups of four, without characters that look alike: 31¹⁶ of them, about 79 bits. */
export function randomPassword(): string {
  const characters = "abcdefghjkmnpqrstuvwxyz23456789";
  const group = () =>
    Array.from({ length: 4 }, () => characters.charAt(randomInt(characters.length))).join("");
  return [group(), group(), group(), group()].join("-");
}
