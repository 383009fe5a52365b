/** Name and version as results and reports print them; a test holds it to package.json. */
export const programName = 'monobis 0.1.0';
