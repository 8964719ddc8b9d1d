/** What a document says may hold line ends and control characters; one line of text must not. */
export const oneLine = (text: string): string => text.replaceAll(/[\p{Cc}\u2028\u2029]+/gu, " ").trim();
