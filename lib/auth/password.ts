/** Length is what makes a password strong; nothing else is asked of it. */
export const shortestPassword = 10
export const longestPassword = 128
