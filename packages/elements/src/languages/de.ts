export const messages = {};
