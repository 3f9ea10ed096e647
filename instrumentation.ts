/** Next calls this once when the server starts, before the first request. */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME === "nodejs") {
    const { onStart } = await import("./instrumentation-node");
    await onStart();
  }
}
