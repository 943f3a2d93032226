/**
 * Makes a teller of progress whose shares never fall and stay within 0 to 1.
 *
 * @param onProgress - the caller's; may be missing
 */
export function createProgress(onProgress: ((share: number) => void) | undefined): (share: number) => void {
  let told = 0;
  return (share) => {
    const next = Math.min(1, Math.max(told, share));
    if (next === told && told > 0) return;
    told = next;
    onProgress?.(next);
  };
}
