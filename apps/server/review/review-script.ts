/**
 * Sends a form as JSON to the route it names, under the version the page shows. A field's name is its path in the body;
 * numbers and ticks are sent as such, empty fields not at all. A refusal stands at the field it concerns.
 */
export const REVIEW_SCRIPT = `
function place(body, path, value) {
  const keys = path.split('.').map((key) => (/^[0-9]+$/.test(key) ? Number(key) : key));
  let at = body;
  keys.slice(0, -1).forEach((key, i) => {
    at[key] ??= typeof keys[i + 1] === 'number' ? [] : {};
    at = at[key];
  });
  at[keys.at(-1)] = value;
}

function bodyOf(form) {
  const body = {};
  for (const field of form.elements) {
    if (!field.name) continue;
    if (field.type === 'checkbox') place(body, field.name, field.checked);
    else if (field.value.trim() !== '') place(body, field.name, field.dataset.number === undefined ? field.value : Number(field.value));
  }
  return body;
}

function clear(form) {
  form.querySelectorAll('.refusal').forEach((line) => line.remove());
  for (const field of form.elements) field.removeAttribute('aria-invalid');
}

const words = ({ expected, found }) => 'Needs ' + expected + '; found ' + found + '.';

// A refusal stands at its field, where the form has one; the rest is given back as one text.
function refuse(form, problems) {
  const others = [];
  let first = null;
  for (const problem of problems) {
    const field = [...form.elements].find(({ name }) => name && name === problem.path);
    if (!field) {
      others.push((problem.path ? problem.path + ': ' : '') + words(problem));
      continue;
    }
    const line = document.createElement('small');
    line.className = 'refusal';
    line.textContent = words(problem);
    field.after(line);
    field.setAttribute('aria-invalid', 'true');
    const folded = field.closest('details');
    if (folded) folded.open = true;
    first ??= field;
  }
  first?.focus();
  return others.join(' ');
}

for (const form of document.querySelectorAll('form[data-act]')) {
  form.addEventListener('submit', async (event) => {
    event.preventDefault();
    const said = form.querySelector('[role=alert]');
    const button = form.querySelector('button');
    button.disabled = true;
    said.textContent = '';
    clear(form);
    try {
      const response = await fetch(form.dataset.act, {
        method: 'POST',
        headers: { 'content-type': 'application/json', 'if-match': form.dataset.seen },
        body: JSON.stringify(bodyOf(form)),
      });
      if (response.ok) return location.reload();
      const problem = await response.json();
      said.textContent = problem.problems.length === 0 ? problem.detail : refuse(form, problem.problems);
    } catch {
      said.textContent = 'No connection to the server. What you typed is kept.';
    }
    button.disabled = false;
  });
}
`;
