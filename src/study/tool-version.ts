/** Version of the program: that of `package.json`, which a test compares. */
export const toolVersion = '0.1.0';
