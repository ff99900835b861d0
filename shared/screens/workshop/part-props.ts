/** What every part of the workshop's settings takes. */
export interface PartProps {
  /** Whether it says its own name; on the phone the header has said it already. */
  titled: boolean;
}
