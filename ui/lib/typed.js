// Changes of what is typed. Everything here returns a new form and leaves the old one as it is. Numbers stay text.

/**
 * What is typed after one change.
 * @param {Desk.Typed} typed
 * @param {Desk.Change} change
 * @returns {Desk.Typed}
 */
export function changed(typed, change) {
  const readings = { ...typed.readings };
  switch (change.change) {
    case 'choose':
      return choose(typed, change.key, change.value);
    case 'type':
      readings[change.key] = { ...readings[change.key], text: change.text, unit: change.unit };
      break;
    case 'unit':
      readings[change.key] = { ...(readings[change.key] ?? { text: '' }), unit: change.unit };
      break;
    case 'swap': {
      const { one, other } = change;
      const kept = readings[one];
      put(readings, one, readings[other]);
      put(readings, other, kept);
      break;
    }
    case 'move':
      put(readings, change.to, readings[change.from]);
      delete readings[change.from];
      break;
    case 'clear':
      delete readings[change.key];
      break;
    case 'accept': {
      const accepted = typed.accepted ?? [];
      return accepted.includes(change.code) ? typed : { ...typed, accepted: [...accepted, change.code] };
    }
    default:
      return typed;
  }
  return { ...typed, readings };
}

/**
 * What is typed after an act, its changes in order.
 * @param {Desk.Typed} typed
 * @param {Desk.Act} act
 */
export function acted(typed, act) {
  return act.changes.reduce(changed, typed);
}

/**
 * @param {Desk.Typed} typed
 * @param {string} key
 * @param {string} value
 * @returns {Desk.Typed}
 */
export function choose(typed, key, value) {
  return { ...typed, choices: { ...typed.choices, [key]: value } };
}

/**
 * A reading's text, as typed beside `unit`: the unit is held with it, so that choosing other units later does not give
 * the digits another meaning. What was said to be right about the old text (`about`) is not said about the new one.
 * @param {Desk.Typed} typed
 * @param {string} key
 * @param {string} text
 * @param {string} unit
 * @param {string[]} [about]
 * @returns {Desk.Typed}
 */
export function typeText(typed, key, text, unit, about = []) {
  const old = typed.readings?.[key];
  return {
    ...typed,
    readings: { ...typed.readings, [key]: { ...old, text, unit: old?.unit ?? unit } },
    accepted: (typed.accepted ?? []).filter((code) => !about.includes(code)),
  };
}

/**
 * A reading's ±, as typed; a blank one is not known.
 * @param {Desk.Typed} typed
 * @param {string} key
 * @param {string} text
 * @param {string} unit
 * @returns {Desk.Typed}
 */
export function typePlusMinus(typed, key, text, unit) {
  const old = typed.readings?.[key] ?? { text: '' };
  const plus_minus = text.trim() === '' ? null : { text, unit };
  return { ...typed, readings: { ...typed.readings, [key]: { ...old, plus_minus } } };
}

/**
 * The text with its sign changed. A plus is not written; a minus typed behind the number counts as one.
 * @param {string} text
 */
export function changeSign(text) {
  const bare = text.trim();
  if (/^[-\u2212]/.test(bare)) return bare.slice(1).trimStart();
  if (/[-\u2212]$/.test(bare)) return bare.slice(0, -1).trimEnd();
  return `\u2212${bare.replace(/^\+\s*/, '')}`;
}

/**
 * Whether anything has been typed or chosen that was not there at first.
 * @param {Desk.Typed} typed
 * @param {Desk.Typed} first
 */
export function differs(typed, first) {
  return JSON.stringify(sorted(typed)) !== JSON.stringify(sorted(first));
}

/** @param {Desk.Typed} typed */
function sorted(typed) {
  return [entries(typed.choices), entries(typed.readings), typed.accepted ?? [], typed.requirements ?? []];
}

/** @param {Record<string, unknown> | undefined} map */
function entries(map) {
  return Object.entries(map ?? {}).sort(([one], [other]) => (one < other ? -1 : 1));
}

/**
 * @param {Record<string, Desk.TypedReading>} readings
 * @param {string} key
 * @param {Desk.TypedReading | undefined} reading
 */
function put(readings, key, reading) {
  if (reading) readings[key] = reading;
  else delete readings[key];
}
