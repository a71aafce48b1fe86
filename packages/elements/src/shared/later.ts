/**
 * A part that is fetched when it is first wanted, once a page.
 * @returns a call that gives the part, `undefined` while it comes, `null` where it cannot be had; `came` is called when that is known
 */
export function later<Part>(fetchPart: () => Promise<Part>): (came: () => void) => Part | null | undefined {
  let part: Part | null | undefined;
  let coming: Promise<void> | undefined;
  return (came) => {
    if (part !== undefined) return part;
    coming ??= fetchPart().then(
      (found) => void (part = found),
      () => void (part = null),
    );
    void coming.then(came);
    return undefined;
  };
}
