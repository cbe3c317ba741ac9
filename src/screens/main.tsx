/** Entry of the screens: fonts and theme, then the frame over one client to the core. */
import "@fontsource/ibm-plex-sans/400.css";
import "@fontsource/ibm-plex-sans/500.css";
import "@fontsource/ibm-plex-sans/600.css";
import "@fontsource/source-serif-4/400.css";
import "@fontsource/source-serif-4/400-italic.css";
import "@fontsource/source-serif-4/600.css";
import "./theme/tokens.css";
import "./theme/base.css";
import { StrictMode } from "react";
import { createRoot } from "react-dom/client";
import { createClient } from "../contract/client.ts";
import { Frame } from "./frame/Frame.tsx";
import { chooseTransport } from "./frame/transport.ts";
import { applyStoredTheme } from "./theme/useTheme.ts";

applyStoredTheme();
const client = createClient(chooseTransport(window));
createRoot(document.getElementById("app")!).render(
  <StrictMode>
    <Frame client={client} />
  </StrictMode>,
);
