// Chromium from Debian's packages; as root it needs --no-sandbox, and it must not call home.
module.exports = (config) => {
  process.env.CHROME_BIN ??= '/usr/bin/chromium';
  config.set({
    frameworks: ['jasmine'],
    plugins: [
      require('karma-jasmine'),
      require('karma-chrome-launcher'),
      require('karma-coverage'),
    ],
    // a busy machine is slow, not wrong: no spec fails for less than this [ms]
    client: {jasmine: {random: true, timeoutInterval: 20_000}, clearContext: true},
    reporters: ['progress'],
    coverageReporter: {dir: 'coverage', reporters: [{type: 'text-summary'}, {type: 'html'}]},
    customLaunchers: {
      ChromiumHeadlessRoot: {
        base: 'ChromeHeadless',
        flags: [
          '--no-sandbox',
          '--disable-gpu',
          '--disable-dev-shm-usage',
          '--disable-background-networking',
          '--disable-component-update',
          '--disable-sync',
          '--disable-quic',
          '--no-first-run',
          '--disable-extensions',
        ],
      },
    },
    browsers: ['ChromiumHeadlessRoot'],
    hostname: '127.0.0.1',
    listenAddress: '127.0.0.1',
    restartOnFileChange: false,
  });
};
