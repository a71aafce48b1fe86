/** Text as it may stand in HTML, in an attribute too. */
export const escaped = (text) => text.replace(/[&<>"]/g, (mark) => ({ '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' })[mark]);
