/** Said when everything else was right; the form knows by it that it has to ask for the code. */
export const CODE_IS_ASKED = 'Type the code that your authenticator shows, or a recovery code.';
