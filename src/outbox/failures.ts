/** Throw this when trying again cannot help: the message is refused at once and the reason kept. */
export class FinalFailure extends Error {}

/** Throw this when something of the lab's own is missing: the message waits with its reason and no try is counted. */
export class NotYet extends Error {}
