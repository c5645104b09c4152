/** Version of the measurement engine; stands in every result. A figure that moves by more than 1e-9 needs a new one. */
export const ENGINE_VERSION = '1.0.0'
