/** The engine's version, kept with every stored result. It changes whenever a result could. */
export const engineVersion = '1.0.0';
