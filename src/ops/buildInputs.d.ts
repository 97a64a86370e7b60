/** SHA-256 over the names and bytes of everything a build reads. */
export function hashInputs(root: string): string;

/** True when the build in `distDirectory` was made from what is on disk now. */
export function buildIsFresh(root: string, distDirectory: string, stampFile: string): boolean;

export function noteBuild(stampFile: string, hash: string): void;
