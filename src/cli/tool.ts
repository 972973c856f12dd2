import manifest from "../../package.json" with { type: "json" };

/** What made a result. */
export const tool = { name: manifest.name, version: manifest.version } as const;
