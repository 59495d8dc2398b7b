// Talks to the API. An answer is { ok, status, body, sentence }: the body as JSON or null, and of a refusal the sentence to show.

const header = { 'X-ResponseLedger': '1' };

export function ask(address) {
  return answer(fetch(address, { headers: { Accept: 'application/json' } }));
}

export function send(method, address, body) {
  const withBody = body === undefined ? {} : { body: JSON.stringify(body) };
  const type = body === undefined ? {} : { 'Content-Type': 'application/json' };
  return answer(fetch(address, { method, headers: { ...header, ...type }, ...withBody }));
}

async function answer(asking) {
  let response;
  try {
    response = await asking;
  } catch {
    return { ok: false, status: 0, body: null, sentence: 'The server cannot be reached. Check that it runs, then try again.' };
  }

  const text = await response.text();
  let body = null;
  try {
    body = text === '' ? null : JSON.parse(text);
  } catch {
    return { ok: false, status: response.status, body: null, sentence: 'The server gave an answer that cannot be read.' };
  }

  return { ok: response.ok, status: response.status, body, sentence: response.ok ? '' : sentenceOf(body) };
}

function sentenceOf(problem) {
  const byField = Object.values(problem?.errors ?? {}).flat();
  return byField.length > 0 ? byField.join(' ') : problem?.detail ?? 'The server refused, and did not say why.';
}
