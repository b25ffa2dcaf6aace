declare const PLUMBLINE_VERSION: string | undefined;

/** The version of the package, written in by the bundler. */
export const VERSION = typeof PLUMBLINE_VERSION === "string" ? PLUMBLINE_VERSION : "0.0.0-source";
