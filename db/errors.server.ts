import pg from "pg";

/** The SQLSTATE codes this program answers to, with their meaning in PostgreSQL's manual, appendix A. */
export const UNIQUE_VIOLATION = "23505";
export const SERIALIZATION_FAILURE = "40001";
export const DEADLOCK_DETECTED = "40P01";

/** True if `error` came from PostgreSQL with this SQLSTATE code. */
export function hasCode(error: unknown, code: string): boolean {
  return error instanceof pg.DatabaseError && error.code === code;
}
