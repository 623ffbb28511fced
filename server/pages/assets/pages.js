// What pages do better with a script: times in the zone of the reader.

const inZone = new Intl.DateTimeFormat(undefined, {
  dateStyle: 'medium',
  timeStyle: 'short',
});

function writeTimes(root) {
  for (const time of root.querySelectorAll('time[datetime]')) {
    time.title = time.textContent;
    time.textContent = inZone.format(new Date(time.dateTime));
  }
}

function tellZone() {
  const note = document.querySelector('[data-zone-note]');
  const { timeZone } = inZone.resolvedOptions();
  if (note !== null) note.textContent = note.dataset.zoneNote.replace('{zone}', timeZone);
}

writeTimes(document);
tellZone();
