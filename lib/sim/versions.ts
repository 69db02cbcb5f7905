/** Kept with every check, so that an old version says what computed it. Raise one when its results change. */
export const ENGINE_VERSIONS = { exact: '1', ode: '1', margins: '1' } as const;
