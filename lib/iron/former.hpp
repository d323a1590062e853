/// The former a coil is wound on, and the room it leaves in the window.
#pragma once

#include <turnwright/iron/lamination.hpp>

#include <optional>

namespace turnwright {

enum class former_kind { layers, bobbin };

/// The word for a kind of former: "layers" (paper-interleaved on a tube), "bobbin" (moulded, with cheeks).
std::string_view word_of(former_kind k);

/// Room for a winding.
struct former {
  former_kind kind = former_kind::layers;
  metres wall;
  metres cheek;                           ///< thickness of each cheek; zero for a tube
  metres winding_width;                   ///< along the limb
  metres winding_height;                  ///< across the window, wall and clearance taken off
  metres clearance;                       ///< left free between coil and outer limb
  standing known_how = standing::memory;  ///< of the room for winding
};

/// What a job fixes of a former.
struct former_wishes {
  former_kind kind = former_kind::layers;
  std::optional<metres> wall, winding_width, winding_height;
};

/// The former for a pattern and stack: a bobbin of the table where there is one, else the window less walls and
/// clearances of practice (memory): tube walls 1.2 mm, cheeks and wall 0.9 to 1.8 mm by size, 0.5 mm free to each yoke,
/// 0.6 mm free to the outer limb. Never less than nothing.
former former_for(const former_wishes& wishes, const pattern_book& patterns, const lamination& l, metres stack);

}  // namespace turnwright
