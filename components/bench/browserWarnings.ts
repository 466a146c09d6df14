/** What this browser cannot promise, in sentences; none in a tested browser at a safe address. */
export function browserWarnings(browser: {
  userAgent: string;
  isSecure: boolean;
  hasServiceWorker: boolean;
}): string[] {
  const warnings: string[] = [];
  if (!browser.isSecure)
    warnings.push(
      'This address is plain http. Away from the shop’s own computer nothing works without a network unless the address begins with https.',
    );
  else if (!browser.hasServiceWorker)
    warnings.push('This browser keeps no pages, perhaps a private window: the bench needs the network here.');
  if (!/Chrom(?:e|ium)\/\d/.test(browser.userAgent))
    warnings.push(
      'Inchwater is tested in Chrome, Edge and other browsers made from Chromium. This one is untested; Safari also clears what a page stored after 7 days unless the app is installed.',
    );
  return warnings;
}
