// The colours of all figures, light and dark. Every pair that must be told apart differs in lightness, so
// that it stays apart in greyscale and for colour-blind readers; and position tells the same again.
#include <string>
#include <string_view>

#include "steelyard/render.hpp"

namespace steelyard {
namespace {

constexpr std::string_view light = R"(.y-figure{font-family:"DejaVu Sans",Verdana,sans-serif}
.y-paper{fill:#fff}
.y-ink{fill:#1c2530}
.y-soft{fill:#525d6b}
.y-rule{stroke:#d5d9e0;stroke-width:.75;fill:none}
.y-frame{stroke:#8c96a3;stroke-width:.75;fill:none}
.y-null{stroke:#1c2530;stroke-width:1;fill:none}
.y-null-mark{fill:#1c2530}
.y-hill{fill:#bfcadb;stroke:#6b7d99;stroke-width:.6}
.y-pool-hill{fill:#ead7a6;stroke:#94701c;stroke-width:.7}
.y-beam{stroke:#7a1f4b;stroke-width:1.2;fill:none}
.y-fulcrum{fill:#7a1f4b}
.y-pool-beam{stroke:#1c2530;stroke-width:1.8;fill:none}
.y-pool-fulcrum{fill:#1c2530}
.y-for{fill:#c77a2a}
.y-against{fill:#1d5a6c}
.y-gap{stroke:#fff;stroke-width:2;fill:none}
.y-for-line{stroke:#a35f16;stroke-width:1.4;fill:none}
.y-against-line{stroke:#1d5a6c;stroke-width:1.4;fill:none}
.y-level-1{fill:#ece5f0;stroke:none}
.y-level-2{fill:#c8b3d4;stroke:none}
.y-level-3{fill:#9472ac;stroke:none}
.y-level-4{fill:#55306f;stroke:none}
.y-level-edge{fill:none;stroke:#55306f;stroke-width:.6}
.y-on-dark{fill:#fff}
.y-dot{fill:#7a1f4b;stroke:#fff;stroke-width:.6}
.y-dot-out{fill:#fff;stroke:#7a1f4b;stroke-width:1.4}
.y-band{fill:#dfe5ee;stroke:none}
.y-band-edge{fill:none;stroke:#6b7d99;stroke-width:.8}
.y-band-wide{fill:none;stroke:#94701c;stroke-width:1;stroke-dasharray:4 2.5}
.y-turn{fill:none;stroke:#1c2530;stroke-width:1.6}
.y-turn-halo{fill:none;stroke:#fff;stroke-width:3.6}
.y-favour-1{fill:#fbf3e8}
.y-favour-2{fill:#f6e0c3}
.y-favour-3{fill:#ecc391}
.y-favour-4{fill:#a8621a}
.y-favour-5{fill:#7c420b}
.y-oppose-1{fill:#ecf3f5}
.y-oppose-2{fill:#cfe2e8}
.y-oppose-3{fill:#a2c8d3}
.y-oppose-4{fill:#2d7288}
.y-oppose-5{fill:#15495a}
)";

constexpr std::string_view dark = R"(.y-paper{fill:#12161c}
.y-ink{fill:#e7eaf0}
.y-soft{fill:#aeb7c4}
.y-rule{stroke:#2c343f}
.y-frame{stroke:#6d7886}
.y-null{stroke:#e7eaf0}
.y-null-mark{fill:#e7eaf0}
.y-hill{fill:#35425a;stroke:#8ea2c2}
.y-pool-hill{fill:#55451d;stroke:#dcb75a}
.y-beam{stroke:#f2a5c6}
.y-fulcrum{fill:#f2a5c6}
.y-pool-beam{stroke:#e7eaf0}
.y-pool-fulcrum{fill:#e7eaf0}
.y-for{fill:#e9a35a}
.y-against{fill:#4fa3b8}
.y-gap{stroke:#12161c}
.y-for-line{stroke:#e9a35a}
.y-against-line{stroke:#4fa3b8}
.y-level-1{fill:#2a2333}
.y-level-2{fill:#4d3b5e}
.y-level-3{fill:#8465a0}
.y-level-4{fill:#d9c3ea}
.y-level-edge{stroke:#d9c3ea}
.y-on-dark{fill:#12161c}
.y-dot{fill:#f2a5c6;stroke:#12161c}
.y-dot-out{fill:#12161c;stroke:#f2a5c6}
.y-band{fill:#222b38}
.y-band-edge{stroke:#8ea2c2}
.y-band-wide{stroke:#dcb75a}
.y-turn{stroke:#e7eaf0}
.y-turn-halo{stroke:#12161c}
.y-favour-1{fill:#241d16}
.y-favour-2{fill:#3d2c18}
.y-favour-3{fill:#5e421d}
.y-favour-4{fill:#d68f45}
.y-favour-5{fill:#f5bd80}
.y-oppose-1{fill:#151f24}
.y-oppose-2{fill:#1a323b}
.y-oppose-3{fill:#1f4b59}
.y-oppose-4{fill:#5db0c5}
.y-oppose-5{fill:#9bdcec}
)";

}  // namespace

std::string svg_stylesheet() {
  return std::string(light) + "@media screen and (prefers-color-scheme:dark){\n" + std::string(dark) + "}\n";
}

}  // namespace steelyard
