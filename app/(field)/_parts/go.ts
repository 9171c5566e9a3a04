const FIELD_PATH = /^\/(today|stop|log|swap|cannot|find|outbox)$/;

/** Opens a phone page without asking the server for anything. */
export function go(href: string, replace = false): void {
  if (replace) window.history.replaceState(null, "", href);
  else window.history.pushState(null, "", href);
  window.scrollTo(0, 0);
}

/** Whether a click on a link can be answered here; modified clicks are left to the browser. */
export function staysHere(event: MouseEvent, link: HTMLAnchorElement): boolean {
  const plain =
    event.button === 0 && !event.metaKey && !event.ctrlKey && !event.shiftKey && !event.altKey;
  const url = new URL(link.href);
  return (
    plain &&
    url.origin === window.location.origin &&
    FIELD_PATH.test(url.pathname) &&
    link.target !== "_blank"
  );
}
