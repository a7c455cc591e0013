// SPDX-License-Identifier: Apache-2.0
// Packing cells one behind the other, each from the start of a cache line.
#include "trace/cells.h"

#include <cstring>

namespace whorl::trace {

void CellSet::add(Cell head, const std::vector<Cubic>& cubics, const std::vector<CellOwner>& owners,
                  const std::vector<FunctionFacts>& facts) {
  head.first_facts = static_cast<std::uint32_t>(facts_.size());
  head.function_count = static_cast<std::uint8_t>(cubics.size());
  head.owner_count = static_cast<std::uint8_t>(owners.size());
  exact_cells_ += head.kind == CellKind::kExact;
  const std::size_t cubic_bytes = cubics.size() * sizeof(Cubic), owner_bytes = owners.size() * sizeof(CellOwner);
  const std::size_t bytes = sizeof(Cell) + cubic_bytes + owner_bytes;
  starts_.push_back(static_cast<std::uint32_t>(tape_.size()));
  tape_.resize(tape_.size() + (bytes + sizeof(Line) - 1) / sizeof(Line), Line{});
  std::byte* at = tape_[starts_.back()].bytes;
  std::memcpy(at, &head, sizeof(Cell));
  if (cubic_bytes > 0) std::memcpy(at + sizeof(Cell), cubics.data(), cubic_bytes);
  if (owner_bytes > 0) std::memcpy(at + sizeof(Cell) + cubic_bytes, owners.data(), owner_bytes);
  facts_.insert(facts_.end(), facts.begin(), facts.end());
}

void CellSet::append(const CellSet& other) {
  const auto lines = static_cast<std::uint32_t>(tape_.size()), first = static_cast<std::uint32_t>(facts_.size());
  const std::size_t own = starts_.size();
  tape_.insert(tape_.end(), other.tape_.begin(), other.tape_.end());
  facts_.insert(facts_.end(), other.facts_.begin(), other.facts_.end());
  for (const std::uint32_t start : other.starts_) starts_.push_back(start + lines);
  for (std::size_t i = own; i < starts_.size(); ++i) reinterpret_cast<Cell&>(tape_[starts_[i]]).first_facts += first;
  exact_cells_ += other.exact_cells_;
}

}  // namespace whorl::trace
