/** The build this client was compiled as; the server names its own in `x-espalier-build`. */
declare const __BUILD_ID__: string;
