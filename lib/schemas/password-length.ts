/** The fewest characters of a password; on its own, for forms that name it without the schema library. */
export const SHORTEST_PASSWORD = 12;
