/** Something that the computation needs and the tables do not hold, in a sentence for people. */
export class MissingInput extends Error {}
