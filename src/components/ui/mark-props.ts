/** A mark is drawn beside words that say the same; its side in px. */
export interface MarkProps {
  readonly size?: number;
}
