const ID = /^[A-Za-z0-9_-]{22}$/;

/** Whether the text has the form of an identifier: 128 random bits in base64url. */
export const isId = (value: string): boolean => ID.test(value);
