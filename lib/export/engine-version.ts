/** Printed on every export, so that a reviewer years later knows what calculated it. The version of package.json. */
export const engineVersion = '0.1.0'
