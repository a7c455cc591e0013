// SPDX-License-Identifier: Apache-2.0
// Builds the sRGB profile from the standard's numbers.
#include "plate/icc_profile.h"

#include "math/vec.h"
#include "shaders_cpu/tone/srgb.h"

#include <array>
#include <cmath>
#include <cstdint>
#include <string_view>
#include <utility>
#include <vector>

namespace whorl::plate {
namespace {

constexpr int kCurveEntries = 1024;
constexpr std::uint32_t kVersion = 0x02400000;
const Vec3 kD50(0.9642, 1.0, 0.8249);  // the profile connection space's white, as ICC.1 rounds it

std::string big_endian(std::uint32_t value, int bytes) {
  std::string text;
  for (int shift = 8 * (bytes - 1); shift >= 0; shift -= 8) text += static_cast<char>(value >> shift & 0xffu);
  return text;
}

std::string fixed(double value) {
  return big_endian(static_cast<std::uint32_t>(static_cast<std::int32_t>(std::lround(value * 65536.0))), 4);
}

std::string triple(const Vec3& xyz) { return fixed(xyz.x) + fixed(xyz.y) + fixed(xyz.z); }

std::string xyz_tag(const Vec3& xyz) { return "XYZ " + big_endian(0, 4) + triple(xyz); }

Vec3 xyz_of(double x, double y) { return {x / y, 1.0, (1.0 - x - y) / y}; }

/// Row-major 3 x 3.
using Matrix = std::array<Vec3, 3>;

Vec3 times(const Matrix& m, const Vec3& v) { return {m[0].dot(v), m[1].dot(v), m[2].dot(v)}; }

Vec3 solve(const Vec3& a, const Vec3& b, const Vec3& c, const Vec3& right) {
  const double determinant = a.dot(b.cross(c));
  return {right.dot(b.cross(c)) / determinant, a.dot(right.cross(c)) / determinant, a.dot(b.cross(right)) / determinant};
}

/// Bradford cone responses (Lam 1985), as ICC.1 recommends for the adaptation to D50.
constexpr double kBradford[3][3] = {{0.8951, 0.2664, -0.1614}, {-0.7502, 1.7135, 0.0367}, {0.0389, -0.0685, 1.0296}};

Vec3 adapted(const Vec3& colour, const Vec3& from, const Vec3& to) {
  Matrix cone;
  for (std::size_t r = 0; r < 3; ++r) cone[r] = Vec3(kBradford[r][0], kBradford[r][1], kBradford[r][2]);
  const Vec3 gain = times(cone, to) / times(cone, from);
  const Vec3 response = times(cone, colour) * gain;
  const Vec3 x(cone[0].x, cone[1].x, cone[2].x), y(cone[0].y, cone[1].y, cone[2].y), z(cone[0].z, cone[1].z, cone[2].z);
  return solve(x, y, z, response);
}

/// Red, green and blue at full strength, in the connection space.
std::array<Vec3, 3> colorants() {
  const Vec3 white = xyz_of(0.3127, 0.3290);
  const Vec3 red = xyz_of(0.64, 0.33), green = xyz_of(0.30, 0.60), blue = xyz_of(0.15, 0.06);
  const Vec3 share = solve(red, green, blue, white);
  return {adapted(red * share.x, white, kD50), adapted(green * share.y, white, kD50), adapted(blue * share.z, white, kD50)};
}

std::string curve_tag() {
  std::string tag = "curv" + big_endian(0, 4) + big_endian(kCurveEntries, 4);
  for (int i = 0; i < kCurveEntries; ++i) {
    const double linear = shaders_cpu::srgb_decode(i / (kCurveEntries - 1.0));
    tag += big_endian(static_cast<std::uint32_t>(std::lround(linear * 65535.0)), 2);
  }
  return tag;
}

std::string description_tag(std::string_view text) {
  std::string tag = "desc" + big_endian(0, 4) + big_endian(static_cast<std::uint32_t>(text.size() + 1), 4);
  tag += text;
  tag += '\0';
  tag.append(4 + 4, '\0');       // no Unicode description
  tag.append(2 + 1 + 67, '\0');  // no ScriptCode description
  return tag;
}

std::string header(std::size_t size) {
  std::string text = big_endian(static_cast<std::uint32_t>(size), 4) + big_endian(0, 4) + big_endian(kVersion, 4);
  text += "mntrRGB XYZ ";
  for (const std::uint32_t part : {1999u, 10u, 18u, 0u, 0u, 0u}) text += big_endian(part, 2);  // the standard's date
  text += "acsp";
  text.append(4 + 4 + 4 + 4 + 8 + 4, '\0');  // platform, flags, maker, model, attributes, intent: none stated
  text += triple(kD50);
  text.resize(128, '\0');
  return text;
}

}  // namespace

std::string srgb_profile() {
  const std::array<Vec3, 3> rgb = colorants();
  const std::string no_rights = std::string("text") + std::string(4, '\0') + "No copyright is claimed" + std::string(1, '\0');
  // Tags that share one body name it once; the three curves are one.
  const std::vector<std::pair<std::vector<std::string>, std::string>> bodies = {
      {{"desc"}, description_tag("sRGB IEC61966-2-1")},
      {{"cprt"}, no_rights},
      {{"wtpt"}, xyz_tag(kD50)},
      {{"rXYZ"}, xyz_tag(rgb[0])},
      {{"gXYZ"}, xyz_tag(rgb[1])},
      {{"bXYZ"}, xyz_tag(rgb[2])},
      {{"rTRC", "gTRC", "bTRC"}, curve_tag()},
  };
  std::uint32_t tags = 0;
  for (const auto& [names, body] : bodies) tags += static_cast<std::uint32_t>(names.size());
  std::string table = big_endian(tags, 4), data;
  const std::size_t data_at = 128 + 4 + 12 * static_cast<std::size_t>(tags);
  for (const auto& [names, body] : bodies) {
    for (const std::string& name : names)
      table += name + big_endian(static_cast<std::uint32_t>(data_at + data.size()), 4) +
               big_endian(static_cast<std::uint32_t>(body.size()), 4);
    data += body;
    data.resize((data.size() + 3) / 4 * 4, '\0');
  }
  return header(data_at + data.size()) + table + data;
}

}  // namespace whorl::plate
