// @ts-check
/*
 * Lets the theme's search run when the site is opened from a folder (file://), where a browser
 * refuses to start a worker: the worker's script runs in a hidden frame instead. From a web server
 * nothing changes. The theme looks for the name IFrameWorker, so the name must stay.
 */
(function () {
  "use strict";
  if (location.protocol !== "file:") return;

  /** Loads scripts one after another into a document; resolves when the last has run. */
  function loadScripts(target, urls) {
    return urls.reduce(function (before, url) {
      return before.then(function () {
        return new Promise(function (resolve, reject) {
          const script = target.createElement("script");
          script.src = url;
          script.onload = resolve;
          script.onerror = reject;
          target.body.appendChild(script);
        });
      });
    }, Promise.resolve());
  }

  class IFrameWorker extends EventTarget {
    constructor(url) {
      super();
      this.frame = document.createElement("iframe");
      this.frame.hidden = true;
      this.frame.title = "search";
      document.body.appendChild(this.frame);
      const inner = this.frame.contentWindow;
      inner.importScripts = function (...urls) {
        return loadScripts(inner.document, urls.map((one) => new URL(one, url).href));
      };
      // What the worker's script posts goes out to the page, not to the frame itself.
      inner.postMessage = (data) => {
        setTimeout(() => this.dispatchEvent(new MessageEvent("message", { data: data })), 0);
      };
      this.ready = loadScripts(inner.document, [url]);
    }

    postMessage(data) {
      const inner = this.frame.contentWindow;
      this.ready.then(function () {
        inner.dispatchEvent(new inner.MessageEvent("message", { data: data }));
      });
    }

    terminate() {
      this.frame.remove();
    }
  }

  window.IFrameWorker = IFrameWorker;
  window.Worker = IFrameWorker;
})();
