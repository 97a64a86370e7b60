/** Class names that apply, in order; what is false, null or undefined does not. */
export function classes(...names: (string | false | null | undefined)[]): string | undefined {
  const applied = names.filter((name) => typeof name === 'string' && name !== '');
  return applied.length > 0 ? applied.join(' ') : undefined;
}
