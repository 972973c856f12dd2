import { createRoot } from "react-dom/client";
import { Workbench } from "./workbench.tsx";

createRoot(document.getElementById("page")!).render(<Workbench />);
