export const commandWords = {};
