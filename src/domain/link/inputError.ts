/** Something in a link request that cannot be computed: where (dots, "stations.0.setup.powerAtFeedW") and a sentence. */
export class LinkInputError extends Error {
  readonly path: string;

  constructor(path: string, sentence: string) {
    super(sentence);
    this.name = 'LinkInputError';
    this.path = path;
  }
}
