/** What somebody is on a paper. A visitor is nobody in particular, on the specimen paper. */
export type Standing = "owner" | "author" | "referee" | "reader" | "visitor";

/** What one may want to do with a paper. */
export type Right = "read" | "write" | "own";

const RIGHTS: Readonly<Record<Standing, readonly Right[]>> = {
  owner: ["read", "write", "own"],
  author: ["read", "write"],
  referee: ["read"],
  reader: ["read"],
  visitor: ["read"],
};

/** "write" is to change the text and its parameters, and to compute; "own" is to add and remove people, and to delete. */
export function may(standing: Standing, right: Right): boolean {
  return RIGHTS[standing].includes(right);
}
