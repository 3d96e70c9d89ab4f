/** One calendar feed that a person has or could have. */
export interface FeedView {
  /** Null: all skeds of the person. */
  stationId: string | null;
  label: string;
  /** Null while there is no address for it. */
  feed: { id: string; createdMs: number; lastReadMs: number | null } | null;
}
