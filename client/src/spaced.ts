/**
 * Does something when it is called for, but never twice within so many milliseconds: calls that come
 * too soon are answered by one more at the end of that time. `dispose` drops what is outstanding.
 */
export function spaced(work: () => void, milliseconds: number): { run(): void; dispose(): void } {
  let resting: ReturnType<typeof setTimeout> | undefined;
  let wanted = false;

  function run(): void {
    if (resting !== undefined) {
      wanted = true;
      return;
    }
    wanted = false;
    resting = setTimeout(() => {
      resting = undefined;
      if (wanted) run();
    }, milliseconds);
    work();
  }

  return {
    run,
    dispose() {
      clearTimeout(resting);
      wanted = false;
    },
  };
}
