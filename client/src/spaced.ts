/**
 * Does something when it is called for, but never twice within so many milliseconds: calls that come
 * too soon are answered by one more at the end of that time. `dispose` drops what is outstanding.
 *
 * @param again so many milliseconds after the last time it is done once more, for what may have missed it
 */
export function spaced(
  work: () => void,
  milliseconds: number,
  again?: number,
): { run(): void; dispose(): void } {
  let resting: ReturnType<typeof setTimeout> | undefined;
  let settling: ReturnType<typeof setTimeout> | undefined;
  let wanted = false;

  function run(): void {
    clearTimeout(settling);
    if (resting !== undefined) {
      wanted = true;
      return;
    }
    wanted = false;
    resting = setTimeout(() => {
      resting = undefined;
      if (wanted) run();
    }, milliseconds);
    if (again !== undefined) settling = setTimeout(work, again);
    work();
  }

  return {
    run,
    dispose() {
      clearTimeout(resting);
      clearTimeout(settling);
      wanted = false;
    },
  };
}
