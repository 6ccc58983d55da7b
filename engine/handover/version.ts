/** Version written into recipes and sheets; the same as in package.json (a test keeps it so). */
export const programVersion = '0.1.0';
