import { html } from '../home/html.js';
import { framedPage } from '../home/page-frame.js';

/** The page a paper is dropped on. */
export function verifyPage(): string {
  const main = html`<h1>Is this paper what was approved?</h1>
<p>A PDF is compared with the issued paper to the last byte; a signature that was added afterwards is recognised. Of an exported plan or calculation sheet every value is compared.</p>
<section aria-labelledby="file"><h2 id="file">A file</h2>
<form id="paper"><div class="drop"><label><span>Drop the file here, or choose it</span><input type="file" name="file" accept=".pdf,.json,.csv,.xlsx"></label></div></form>
<p id="answer" role="status"></p></section>
<section aria-labelledby="scan"><h2 id="scan">A scan or a print</h2>
<p>Type the number behind “content” at the head of its pages. It names the plan; compare what the sheet shows with it.</p>
<form id="number"><label><span>Content number</span><input name="number" autocomplete="off" spellcheck="false" maxlength="100"></label><button class="quiet">Look it up</button></form>
<p id="found" role="status"></p></section>
<noscript><p>This page needs scripts. The command <code>varwright verify FILE</code> does the same without.</p></noscript>`;
  return framedPage({ title: 'Verify a paper – Varwright', main, script: '/verify.js' });
}

/** Sends the file as it is and shows the sentence that comes back. */
export const VERIFY_SCRIPT = `
const paper = document.getElementById('paper');
const number = document.getElementById('number');
const drop = paper.querySelector('.drop');
const answer = document.getElementById('answer');
const found = document.getElementById('found');

async function ask(where, request, words) {
  where.textContent = 'Looking it up.';
  try {
    const response = await request();
    const body = await response.json();
    where.textContent = response.ok ? words(body) : body.detail;
  } catch {
    where.textContent = 'No connection to the server. Nothing was compared.';
  }
}

function send(file) {
  const request = () =>
    fetch('/api/verify', { method: 'POST', headers: { 'content-type': 'application/octet-stream' }, body: file });
  if (file) ask(answer, request, (body) => file.name + ': ' + body.text);
}

paper.addEventListener('change', (event) => send(event.target.files[0]));
paper.addEventListener('submit', (event) => event.preventDefault());
for (const type of ['dragover', 'dragleave', 'drop']) {
  drop.addEventListener(type, (event) => {
    event.preventDefault();
    drop.classList.toggle('over', type === 'dragover');
    if (type === 'drop') send(event.dataTransfer.files[0]);
  });
}
number.addEventListener('submit', (event) => {
  event.preventDefault();
  const typed = new URLSearchParams(new FormData(number));
  const words = (body) => body.papers.map(({ text }) => text).join(' ') || 'No plan of this register has that number.';
  ask(found, () => fetch('/api/verify?' + typed), words);
});
`;
