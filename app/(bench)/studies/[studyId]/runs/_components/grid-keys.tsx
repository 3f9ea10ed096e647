import { MarginSection } from "@/app/_ui/margin";

/** The keys of a grid, for the margin beside it. */
export function GridKeys() {
  return (
    <MarginSection title="Keys">
      <dl className="key-list">
        <dt>
          <kbd>↑</kbd> <kbd>↓</kbd> <kbd>←</kbd> <kbd>→</kbd>
        </dt>
        <dd>move; with Shift select</dd>
        <dt>
          <kbd>Enter</kbd> <kbd>Tab</kbd>
        </dt>
        <dd>keep, go down or right</dd>
        <dt>
          <kbd>F2</kbd>
        </dt>
        <dd>edit in place</dd>
        <dt>
          <kbd>0</kbd> to <kbd>9</kbd>
        </dt>
        <dd>replace</dd>
        <dt>
          <kbd>Delete</kbd>
        </dt>
        <dd>empty</dd>
        <dt>
          <kbd>Ctrl Z</kbd>
        </dt>
        <dd>undo</dd>
        <dt>
          <kbd>Ctrl V</kbd>
        </dt>
        <dd>paste a block</dd>
        <dt>
          <kbd>Ctrl D</kbd>
        </dt>
        <dd>fill down</dd>
      </dl>
    </MarginSection>
  );
}
