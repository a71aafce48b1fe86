/** An entry made of a few lines of code, its imports resolved as if it lay at `path`, where no file needs to be. */
export function lines(path, code) {
  return {
    name: 'lines',
    resolveId: (id) => (id === path ? path : null),
    load: (id) => (id === path ? code : null),
  };
}
