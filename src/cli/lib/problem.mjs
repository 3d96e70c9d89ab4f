/** A reason for a person why a command cannot go on: printed as one sentence, without a stack trace. */
export class Problem extends Error {}
