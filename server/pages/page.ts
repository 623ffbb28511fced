/** A small HTML page that needs neither script nor style from anywhere. */
export function page(title: string, body: string): string {
  const escaped = escapeHtml(title);
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escaped} - Sweep Ledger</title>
</head>
<body>
<main>
<h1>${escaped}</h1>
${body}
</main>
</body>
</html>
`;
}

const entities: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

/** Text made safe for HTML content and quoted attributes. */
export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (character) => entities[character] ?? character);
}
