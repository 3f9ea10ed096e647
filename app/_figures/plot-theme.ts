"use client";

import { useSyncExternalStore } from "react";
import dark from "./plot-template.dark.json";
import light from "./plot-template.light.json";

/** The plot's template for the scheme that is on: axes, grid, hover panel and fonts of the drawing. */
export function usePlotTemplate(): typeof light {
  return useSyncExternalStore(onSchemeChange, isDark, () => false) ? dark : light;
}

function isDark(): boolean {
  const chosen = document.documentElement.dataset.theme;
  return chosen === undefined ? matchMedia("(prefers-color-scheme: dark)").matches : chosen === "dark";
}

function onSchemeChange(changed: () => void): () => void {
  const system = matchMedia("(prefers-color-scheme: dark)");
  const choice = new MutationObserver(changed);
  system.addEventListener("change", changed);
  choice.observe(document.documentElement, { attributeFilter: ["data-theme"] });
  return () => {
    system.removeEventListener("change", changed);
    choice.disconnect();
  };
}

/** A colour over the tokens as plotly can read it, "rgb(1, 97, 142)". */
export function resolveColour(colour: string): string {
  const probe = document.createElement("span");
  probe.style.color = colour;
  document.body.append(probe);
  const resolved = getComputedStyle(probe).color;
  probe.remove();
  return resolved.startsWith("rgb") ? resolved : rgbOf(resolved);
}

/** Mixed colours compute to `color(srgb r g b)` or `oklab(…)`; a canvas turns any of them into plain bytes. */
function rgbOf(colour: string): string {
  const context = document.createElement("canvas").getContext("2d");
  if (context === null) return colour;
  context.fillStyle = colour;
  context.fillRect(0, 0, 1, 1);
  const [red, green, blue] = context.getImageData(0, 0, 1, 1).data;
  return `rgb(${red}, ${green}, ${blue})`;
}
