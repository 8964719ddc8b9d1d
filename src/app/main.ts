import "./styles/tokens.css";
import "./styles/page.css";
import "./app.ts";
