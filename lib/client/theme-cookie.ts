/** Name of the cookie that holds the chosen theme; the server reads it, so that the first paint is already right. */
export const themeCookie = 'outfold-theme';
