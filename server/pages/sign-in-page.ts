import { type Html, html } from './html.ts';
import { texts } from './texts.ts';

const words = texts.signIn;

export interface SignInParts {
  /** Where to go on to. */
  readonly next: string;
  /** What was wrong with the token that was sent. */
  readonly fault: string | null;
  /** The reader came by a link on another site, so the browser held the cookie back. */
  readonly fromElsewhere: boolean;
}

/** The form that takes a token. */
export function signInPage({ next, fault, fromElsewhere }: SignInParts): Html {
  const described = fault === null ? 'token-help' : 'token-fault token-help';
  return html`${fault === null ? null : html`<p class="fault" role="alert" id="token-fault">${fault}</p>`}
<form method="post" action="/sign-in" class="stack">
<input type="hidden" name="next" value="${next}">
<p id="token-help">${words.intro}</p>
<label for="token">${words.token}</label>
<input id="token" name="token" type="password" autocomplete="current-password" required maxlength="100" spellcheck="false" autocapitalize="none" aria-describedby="${described}"${fault === null ? null : html` aria-invalid="true"`}>
<label class="choice"><input type="checkbox" name="stay" value="yes"> ${words.stay}</label>
<button>${words.button}</button>
</form>
<p class="aside">${words.privacy}</p>
${fromElsewhere ? html`<p><a href="${next}">${words.goOn}</a></p>` : null}`;
}
