import type { Config } from "tailwindcss";

export default { content: ["./app/**/*.{ts,tsx}"] } satisfies Config;
