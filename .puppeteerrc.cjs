// The browser is found or unpacked by generator/print/browser; puppeteer must not try to download one.
module.exports = { skipDownload: true }
