/** Times one run over the chosen file in a worker of its own. */
Object.assign(window, {
  bench(what: "decode" | "measure") {
    const file = document.querySelector("input")?.files?.[0];
    const worker = new Worker(new URL("./bench.worker.ts", import.meta.url), { type: "module" });
    return new Promise((resolve, reject) => {
      worker.onmessage = ({ data }) => {
        worker.terminate();
        resolve(data);
      };
      worker.onerror = (event) => reject(new Error(event.message));
      worker.postMessage({ what, file });
    });
  },
});
