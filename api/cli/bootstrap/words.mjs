/** English of the part that runs before any package is installed. */
export const words = {
  nodeTooOld: (has, wants) =>
    `Tetherline needs Node ${wants}, this is ${has}. Install a newer Node and start again.`,
  installing: 'Installing packages (once, and when they change)…',
  installFailed: (code) =>
    `npm ci ended with code ${code}. Its message stands above; mend it and start again.`,
  unknownCommand: (command) =>
    `Unknown command “${command}”. Use npm start, npm run dev or npm test.`,
};
