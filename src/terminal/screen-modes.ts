/**
 * Alternate screen (it keeps what was on the screen, and the cursor), cursor hidden, no wrapping at the right edge so that nothing can
 * scroll, pasted text marked as such. xterm control sequences, DEC private modes 1049, 25, 7 and 2004.
 */
export const enterScreen = '\u001b[?1049h\u001b[?25l\u001b[?7l\u001b[?2004h';

/** The same backwards; a synchronised update that was cut off is ended first. */
export const leaveScreen = '\u001b[?2026l\u001b[?2004l\u001b[?7h\u001b[m\u001b[?25h\u001b[?1049l';
