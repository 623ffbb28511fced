// What pages do better with a script: times in the zone of the reader, files dropped, progress shown.

const inZone = new Intl.DateTimeFormat(undefined, { dateStyle: 'medium', timeStyle: 'short' });

const clock = new Intl.DateTimeFormat(undefined, { timeStyle: 'medium' });
/** What comes within this is shown at once. */
const gatherMs = 300;
const changes = [
  'reset',
  'sweep_added',
  'antennas_added',
  'antennas_edited',
  'sites_added',
  'sites_edited',
  'work_added',
  'test_interval_set',
];

function writeTimes(root) {
  for (const time of root.querySelectorAll('time[datetime]')) {
    time.title = time.textContent;
    time.textContent = inZone.format(new Date(time.dateTime));
  }
  for (const label of root.querySelectorAll('[data-zone-label]')) {
    label.textContent = label.dataset.zoneLabel;
  }
}

function tellZone() {
  const note = document.querySelector('[data-zone-note]');
  const { timeZone } = inZone.resolvedOptions();
  if (note !== null) note.textContent = note.dataset.zoneNote.replace('{zone}', timeZone);
}

/** The time that was filled in, in UTC beside it: the field itself has no zone. */
function tellUtc(form) {
  const { measured_at: local, measured_at_utc: utc } = form.elements;
  utc.value = local.value === '' ? '' : new Date(local.value).toISOString();
}

function takeDrops(form) {
  const picker = form.elements.namedItem('file');
  if (picker === null) return;
  form.addEventListener('dragover', (event) => {
    event.preventDefault();
    form.classList.add('over');
  });
  form.addEventListener('dragleave', () => form.classList.remove('over'));
  form.addEventListener('drop', (event) => {
    event.preventDefault();
    form.classList.remove('over');
    if (event.dataTransfer.files.length > 0) picker.files = event.dataTransfer.files;
  });
}

/** Sends the form and shows what comes back: the sweep's own page, or the form with what to mend. */
function send(form) {
  const { sending, reading, failed } = form.dataset;
  const told = form.querySelector('.progress');
  const button = form.querySelector('button');
  const request = new XMLHttpRequest();
  request.upload.addEventListener('progress', ({ loaded, total }) => {
    told.textContent = sending.replace('{percent}', String(Math.round((100 * loaded) / total)));
  });
  request.upload.addEventListener('load', () => {
    told.textContent = reading;
  });
  request.addEventListener('error', () => {
    told.textContent = failed;
    button.disabled = false;
  });
  request.addEventListener('load', () => {
    const { pathname } = new URL(request.responseURL);
    if (pathname !== '/upload') window.location.assign(request.responseURL);
    else showAnswer(request.response);
  });
  request.open('POST', form.action);
  request.responseType = 'document';
  request.send(new FormData(form));
  button.disabled = true;
}

function showAnswer(answer) {
  const main = document.querySelector('main');
  main.replaceWith(document.adoptNode(answer.querySelector('main')));
  improve(document);
  document.querySelector('main').focus();
  window.scrollTo(0, 0);
}

/** Keeps the board as it is now: whatever happens in the club, it is fetched anew. */
function followBoard(board) {
  const told = document.querySelector('[data-changed]');
  let isWaiting = false;
  const renew = async () => {
    isWaiting = false;
    const answer = await fetch(window.location.href);
    const fresh = new DOMParser().parseFromString(await answer.text(), 'text/html');
    const next = fresh.querySelector('#board');
    if (next === null) return;
    writeTimes(next);
    board.replaceChildren(...document.adoptNode(next).childNodes);
    told.textContent = told.dataset.changed.replace('{time}', clock.format(new Date()));
  };
  const later = () => {
    if (isWaiting) return;
    isWaiting = true;
    setTimeout(() => renew().catch(() => undefined), gatherMs);
  };
  const events = new EventSource(board.dataset.events);
  for (const kind of changes) events.addEventListener(kind, later);
}

function improve(root) {
  writeTimes(root);
  for (const form of root.querySelectorAll('form.upload')) {
    takeDrops(form);
    form.addEventListener('submit', (event) => {
      event.preventDefault();
      tellUtc(form);
      send(form);
    });
  }
}

improve(document);
tellZone();
const board = document.querySelector('#board');
if (board !== null) followBoard(board);
