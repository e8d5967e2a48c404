/** Goes to a page of ours loaded whole: the server draws the navigation anew for what somebody has just become. */
export const loadWhole = (path: string): void => window.location.assign(path)
