/** A session ends for good after this, however busy it was. */
export const SESSION_LIFE_S = 12 * 3600
