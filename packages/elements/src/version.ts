/** The version every element of this copy reports; kept equal to package.json by a test. */
export const version = '0.1.0';
