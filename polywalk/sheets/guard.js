"use strict";
// The page's policy forbids style attributes and style elements. plotly.js sets some attributes, which mean the same
// when set as properties, and brings a style for maps, of which a sheet has none.
(() => {
  const set = Element.prototype.setAttribute;
  Element.prototype.setAttribute = function (name, value) {
    if (name === "style" && this.style) this.style.cssText = value;
    else set.call(this, name, value);
  };
  const append = document.head.appendChild;
  document.head.appendChild = function (node) {
    return node.nodeName === "STYLE" && node.textContent ? node : append.call(this, node);
  };
})();
