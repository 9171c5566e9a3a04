/** Set by the proxy on every request, whatever the client sent: the path with its query. */
export const PATH_HEADER = "x-wanewright-path";
