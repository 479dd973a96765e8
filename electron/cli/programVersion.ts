/** The version of the program, as in package.json (a test holds the two together). */
export const programVersion = '0.1.0';
