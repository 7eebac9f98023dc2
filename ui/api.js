// The one module that knows how a request reaches the desk: through the window's command, or, in a browser, through the
// server on this machine that gave the page.

/** A request that has no reply: `code` is for the program, `message` for the person, `field` names what to mark. */
export class Fault extends Error {
  /** @param {Desk.Fault} fault */
  constructor(fault) {
    super(fault.message);
    this.code = fault.code;
    this.field = fault.field ?? null;
  }
}

const tokenName = 'dewledger-token';
const token = takeToken();

/**
 * The server's token comes once in the page's address and does not stay there, where it could be copied along.
 * A reload finds it in the tab's own storage.
 */
function takeToken() {
  const found = /[#?&]token=([^&#]+)/.exec(location.hash) ?? /[?&]token=([^&#]+)/.exec(location.search);
  if (found?.[1]) {
    sessionStorage.setItem(tokenName, found[1]);
    history.replaceState(null, '', location.pathname);
    return found[1];
  }
  try {
    return sessionStorage.getItem(tokenName);
  } catch {
    return null;
  }
}

/**
 * Asks the desk.
 * @template {Desk.Reply['reply']} Kind
 * @param {Desk.Request} request
 * @param {...Kind} kinds the kinds of reply that this request has
 * @returns {Promise<Extract<Desk.Reply, { reply: Kind }>>}
 * @throws {Fault}
 */
export async function ask(request, ...kinds) {
  const answer = JSON.parse(await send(JSON.stringify(request)));
  if (answer.fault) throw new Fault(answer.fault);
  if (!kinds.includes(answer.ok?.reply)) {
    throw new Fault({
      code: 'bad_request',
      message: 'The app got an answer to another question. Close it and open it again.',
    });
  }
  return answer.ok;
}

/**
 * @param {string} request
 * @returns {Promise<string>}
 */
async function send(request) {
  const shell = /** @type {any} */ (window).__TAURI__;
  if (shell) return shell.core.invoke('ask', { request });
  /** @type {Response} */
  let response;
  try {
    response = await fetch('/ask', {
      method: 'POST',
      headers: { 'Content-Type': 'application/json', 'X-Dewledger-Token': token ?? '' },
      body: request,
    });
  } catch {
    throw new Fault({
      code: 'not_stored',
      message: 'The program behind this page does not answer. Start it again and open the address that it prints.',
    });
  }
  const text = await response.text();
  if (!text.startsWith('{')) {
    throw new Fault({
      code: 'bad_request',
      message: 'This page was opened without its key. Open the address that the program printed.',
    });
  }
  return text;
}
