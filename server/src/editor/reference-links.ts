/** Makes the address of a check's page in the reference; `undefined` where the client has no such page. */
export interface ReferenceLinks {
  check(name: string): string | undefined;
}

/** No page is at hand: findings then show their names without a link. */
export const NO_LINKS: ReferenceLinks = { check: () => undefined };

/** Pages in a folder, given as a URI without a slash at its end. */
export function linksIn(folderUri: string): ReferenceLinks {
  return { check: (name) => `${folderUri}/checks/${encodeURIComponent(name)}.md` };
}
