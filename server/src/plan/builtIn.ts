/** The name of the limits that hold where a note names none; nobody else's may have it. */
export const BUILT_IN_NAME = "common-practice";

/** Where the built-in limits are said to be; the editor opens the file that ships with it. */
export const BUILT_IN_URI = "plumbline:common-practice";
