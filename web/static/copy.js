// Buttons that copy the text of the element that they name. They are hidden until
// here, as the text can be selected without them, and where copying is not allowed.
"use strict";
(() => {
  if (!navigator.clipboard) return;
  for (const button of document.querySelectorAll("button[data-copy]")) {
    const said = button.parentElement.querySelector("[role=status]");
    button.hidden = false;
    button.addEventListener("click", async () => {
      try {
        await navigator.clipboard.writeText(document.getElementById(button.dataset.copy).textContent.trim() + "\n");
        said.textContent = "Copied.";
      } catch {
        said.textContent = "The browser does not allow it; the text is above, under “as text”.";
      }
      setTimeout(() => { said.textContent = ""; }, 4000);
    });
  }
})();
