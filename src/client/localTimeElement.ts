import { momentText } from '#lib/format/momentText.ts';

/** `<local-time>` around a `<time>` in UTC: shows the reader's own time instead, also when it is put in later. */
class LocalTimeElement extends HTMLElement {
  connectedCallback() {
    const time = this.querySelector('time');
    if (time) time.textContent = momentText(time.dateTime, Intl.DateTimeFormat().resolvedOptions().timeZone);
  }
}

if (!customElements.get('local-time')) customElements.define('local-time', LocalTimeElement);
