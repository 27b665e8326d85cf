/** Stored with every saved result; raised whenever the engine could answer differently for the same study model. */
export const engineVersion = '1.0.0';
