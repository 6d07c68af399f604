/** Key under which a person's columns are kept, one set for all campaigns. */
export const RANKING_COLUMNS_PREFERENCE = 'ranking-columns'
