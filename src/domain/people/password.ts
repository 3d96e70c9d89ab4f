/** Shortest password taken. Length is all that is asked for, apart from not being a common one. */
export const PASSWORD_MIN_LENGTH = 10;
