const alphabet = '0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZ';

/**
 * The check character of ISO/IEC 7064 MOD 37,36 over digits and capital letters. It catches every single wrong
 * character and nearly every swap of neighbours.
 * @throws RangeError for anything but digits and capital letters.
 */
export function checkCharacter(text: string): string {
  const modulus = alphabet.length;
  let carried = modulus;
  for (const character of text) {
    const value = alphabet.indexOf(character);
    if (value < 0) throw new RangeError(`‘${character}’ is neither a digit nor a capital letter.`);
    const sum = (carried + value) % modulus || modulus;
    carried = (sum * 2) % (modulus + 1);
  }
  const check = (modulus + 1 - carried) % modulus;
  return alphabet.charAt(check);
}

/**
 * The participant code: site prefix, running number of the site, check character. `NM` and 42 make 'NM-0042' and the
 * check character over 'NM0042'.
 * @throws RangeError for a prefix that is not two capital letters, or a number that is not positive and whole.
 */
export function participantCode(sitePrefix: string, number: number): string {
  if (!/^[A-Z]{2}$/.test(sitePrefix)) throw new RangeError(`‘${sitePrefix}’ is not a site prefix of two capital letters.`);
  if (!Number.isInteger(number) || number < 1) throw new RangeError(`${number} is not a running number.`);
  const digits = String(number).padStart(4, '0');
  return `${sitePrefix}-${digits}${checkCharacter(`${sitePrefix}${digits}`)}`;
}

/** Whether the text is a participant code whose check character is right. */
export function isParticipantCode(text: string): boolean {
  const match = /^([A-Z]{2})-(\d{4,6})([0-9A-Z])$/.exec(text);
  return match !== null && checkCharacter(`${match[1]}${match[2]}`) === match[3];
}
