// SPDX-License-Identifier: Apache-2.0
// Buffers shared with Embree, closest and any hit.
#include "triangles_contender.h"

#include "stopwatch.h"
#include "trace/embree_ray.h"

#include <atomic>
#include <cmath>
#include <limits>

namespace whorl::bench {
namespace embree = trace::embree;

struct TrianglesContender::Impl {
  Mesh mesh;
  std::atomic<std::ptrdiff_t> bytes{0};
  RTCDevice device = nullptr;
  RTCScene scene = nullptr;

  ~Impl() {
    if (scene) rtcReleaseScene(scene);
    if (device) rtcReleaseDevice(device);
  }
  static bool watch(void* self, ssize_t bytes, bool) {
    static_cast<Impl*>(self)->bytes += bytes;
    return true;
  }
};

TrianglesContender::TrianglesContender(Mesh mesh) : impl_(std::make_unique<Impl>()) {
  Impl& self = *impl_;
  self.mesh = std::move(mesh);
  self.mesh.points.reserve(self.mesh.points.size() + 1);  // Embree reads 16 bytes from the last point
  elements = self.mesh.triangles.size() / 3;
  build_seconds = self.mesh.seconds;
  const Stopwatch watch;
  self.device = rtcNewDevice(nullptr);
  rtcSetDeviceMemoryMonitorFunction(self.device, &Impl::watch, impl_.get());
  self.scene = rtcNewScene(self.device);
  RTCGeometry geometry = rtcNewGeometry(self.device, RTC_GEOMETRY_TYPE_TRIANGLE);
  rtcSetSharedGeometryBuffer(geometry, RTC_BUFFER_TYPE_VERTEX, 0, RTC_FORMAT_FLOAT3, self.mesh.points.data(), 0, sizeof(Vec3f),
                             self.mesh.points.size());
  rtcSetSharedGeometryBuffer(geometry, RTC_BUFFER_TYPE_INDEX, 0, RTC_FORMAT_UINT3, self.mesh.triangles.data(), 0,
                             3 * sizeof(std::uint32_t), elements);
  rtcCommitGeometry(geometry);
  rtcAttachGeometry(self.scene, geometry);
  rtcReleaseGeometry(geometry);
  rtcCommitScene(self.scene);
  hierarchy_seconds = watch.seconds();
  bytes = static_cast<std::size_t>(self.bytes.load()) + self.mesh.points.size() * sizeof(Vec3f) +
          self.mesh.triangles.size() * sizeof(std::uint32_t);
}

TrianglesContender::~TrianglesContender() = default;

bool TrianglesContender::closest(const trace::Ray& ray, Found& found) const {
  RTCRayHit query = embree::query_of(ray);
  embree::Payload payload;
  embree::prepare(payload);
  embree::trace_closest(impl_->scene, query, payload);
  if (query.hit.geomID == RTC_INVALID_GEOMETRY_ID) return false;
  const Vec3f normal(query.hit.Ng_x, query.hit.Ng_y, query.hit.Ng_z);
  const float length = std::sqrt(normal.dot(normal));
  const float side = normal.dot(ray.direction) > 0.0f ? -1.0f : 1.0f;
  found = {query.ray.tfar, normal * (side / length)};
  return true;
}

bool TrianglesContender::occluded(const trace::Ray& ray) const {
  RTCRay query = embree::ray_of(ray);
  embree::Payload payload;
  embree::prepare(payload);
  embree::trace_any(impl_->scene, query, payload);
  return query.tfar < 0.0f;
}

}  // namespace whorl::bench
