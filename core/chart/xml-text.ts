/** What XML 1.0 (section 2.2) does not allow in a document, and surrogates without a partner. */
const forbidden = /[^\t\n\r\u{20}-\u{d7ff}\u{e000}-\u{fffd}\u{10000}-\u{10ffff}]/gu;

const entities: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

/** Any text as content or as a quoted attribute of XML or HTML; what neither allows becomes U+FFFD. */
export function xmlText(text: string): string {
  return text.replace(forbidden, '\ufffd').replace(/[&<>"']/g, (sign) => entities[sign]);
}
